import { Plus, Settings2 } from 'lucide-react';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { text } from '../../shared/text.js';
import { Button, ButtonLink } from '../components/button.js';
import { DropPage } from '../components/drop-page.js';
import { PageFrame } from '../components/page-frame.js';
import { ProjectScope, type Scope } from '../components/project-scope.js';
import { Section } from '../components/section.js';
import { StatusWord } from '../components/status-word.js';
import { TeamSelect } from '../components/team-select.js';
import { Trail } from '../components/trail.js';
import { ItemSummary } from '../features/items/item-summary.js';
import { Ledger } from '../features/projects/ledger.js';
import { ProjectSettings } from '../features/projects/project-settings.js';
import { SheetList } from '../features/projects/sheet-list.js';
import { handFiles } from '../lib/handed-files.js';
import { reasonAgainst } from '../lib/projects.js';

export function Component() {
  return <ProjectScope>{(scope) => <ProjectPage {...scope} />}</ProjectScope>;
}

function ProjectPage({ project, me, team }: Scope) {
  const navigate = useNavigate();
  const [isSettingUp, setIsSettingUp] = useState(false);
  const addReason = reasonAgainst('source:create', team, me.verified);
  const unpack = (files: File[]) => {
    handFiles(files);
    void navigate(`/p/${project.id}/add`);
  };
  return (
    <DropPage onFiles={unpack} isOff={addReason !== undefined}>
      <PageFrame
        title={project.name}
        trail={<Trail steps={[{ to: '/home', label: text.common.home }]} />}
        barContent={<TeamSelect me={me} />}
        actions={
          <>
            <Button
              icon={<Settings2 size={18} aria-hidden />}
              reason={reasonAgainst('project:update', team, me.verified)}
              onClick={() => setIsSettingUp(true)}
            >
              {text.project.settings}
            </Button>
            <Button look="primary" icon={<Plus size={18} aria-hidden />} reason={addReason} onClick={() => unpack([])}>
              {text.project.addSweeps}
            </Button>
          </>
        }
      >
        <div className="mb-6 flex flex-wrap items-center gap-3">
          {project.isInvented && <StatusWord tone="plain">{text.project.invented}</StatusWord>}
          <p className="max-w-prose text-read">{project.note}</p>
          <p className="w-full text-soft">{text.project.counts(project.counts)}</p>
        </div>
        <div className="grid gap-x-8 lg:grid-cols-[2fr_1fr]">
          <Section title={text.project.ledger}>
            <Ledger />
          </Section>
          <div>
            <Section title={text.project.sheets}>
              <SheetList />
            </Section>
            <Section
              title={text.project.items}
              actions={<ButtonLink to={`/p/${project.id}/items`}>{text.project.allItems}</ButtonLink>}
            >
              <ItemSummary />
            </Section>
          </div>
        </div>
      </PageFrame>
      {isSettingUp && <ProjectSettings project={project} onClose={() => setIsSettingUp(false)} />}
    </DropPage>
  );
}
