import { useQuery } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { ErrorBar } from '../components/error-bar.js';
import { Loading } from '../components/loading.js';
import { PageFrame } from '../components/page-frame.js';
import { ProjectScope, type Scope } from '../components/project-scope.js';
import { SheetName } from '../features/sheet/sheet-name.js';
import { SheetWorkspace } from '../features/sheet/sheet-workspace.js';
import { useProjectStore } from '../lib/project-store/store-context.js';
import { sheetQuery } from '../lib/project-store/store-queries.js';
import { sheetSlots } from './sheet-slots.js';

export function Component() {
  return <ProjectScope>{(scope) => <SheetPage {...scope} />}</ProjectScope>;
}

function SheetPage({ project }: Scope) {
  const { sheet: sheetId = '' } = useParams();
  const store = useProjectStore();
  const { data: sheet, error } = useQuery(sheetQuery(store, sheetId));
  if (!sheet) {
    return (
      <PageFrame title={project.name} isTitleHidden>
        {error ? <ErrorBar error={error} /> : <Loading />}
      </PageFrame>
    );
  }
  return (
    <SheetWorkspace
      key={sheet.id}
      sheet={sheet}
      opensUnpack={false}
      slots={sheetSlots}
      frame={(bar, panes) => (
        <PageFrame
          title={sheet.name}
          isTitleHidden
          isFull
          barContent={
            <>
              <SheetName sheet={sheet} project={project} />
              {bar}
            </>
          }
        >
          {panes}
        </PageFrame>
      )}
    />
  );
}
