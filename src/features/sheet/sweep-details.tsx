import { Download } from 'lucide-react';
import { SWEEP_ROLES, type SweepConditions, type SweepRole, type SweepRow } from '../../../shared/contracts/sweep.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { Findings } from '../../components/findings.js';
import { Select } from '../../components/select.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { useUpdateRow } from '../../lib/project-store/store-mutations.js';
import { BoundedNumberField } from './bounded-number-field.js';
import { PistonDrawing } from './piston-drawing.js';
import { useSheetScene } from './sheet-context.js';

const words = text.sheet.ledger;
const MOST_MASS_KG = 10;
const MOST_VOLUME_M3 = 100;

/** How the thing was held, what was told with it, how its file was read, and the file itself. */
export function SweepDetails({ sweep }: { sweep: SweepRow }) {
  const { readOnlyReason } = useSheetScene();
  const store = useProjectStore();
  const update = useUpdateRow('sweeps');
  const { conditions, revision, source } = sweep;
  const change = (part: Partial<SweepConditions>) => {
    const next = { ...conditions, ...part };
    const kept = Object.entries(next).filter(([, value]) => value !== undefined);
    update.mutate({ seen: sweep, change: { conditions: Object.fromEntries(kept) as SweepConditions } });
  };
  const download = () =>
    void store.sourceBytes(sweep).then(({ file, fileName }) => {
      const link = document.createElement('a');
      link.href = URL.createObjectURL(file);
      link.download = fileName;
      link.click();
      setTimeout(() => URL.revokeObjectURL(link.href), 1000);
    });
  return (
    <div className="flex flex-col gap-3 border-t border-line bg-sheet px-3 py-3">
      <fieldset disabled={readOnlyReason !== undefined} className="flex flex-col gap-3">
        <legend className="sr-only">{words.details(sweep.name)}</legend>
        <Select<SweepRole>
          label={words.roleLabel}
          options={SWEEP_ROLES.map((role) => ({ value: role, label: words.roles[role] }))}
          value={conditions.role}
          onValue={(role) => change({ role })}
        />
        {conditions.role === 'added-mass' && (
          <BoundedNumberField
            label={words.mass}
            unit="kg"
            value={conditions.addedMassKg}
            preset={0.01}
            most={MOST_MASS_KG}
            onValue={(addedMassKg) => change({ addedMassKg })}
          />
        )}
        {conditions.role === 'known-volume' && (
          <BoundedNumberField
            label={words.volume}
            unit="m³"
            value={conditions.testVolumeM3}
            preset={0.01}
            most={MOST_VOLUME_M3}
            onValue={(testVolumeM3) => change({ testVolumeM3 })}
          />
        )}
      </fieldset>
      {conditions.role === 'free-air' && <PistonDrawing />}
      {revision.findings.length > 0 && (
        <div>
          <h4 className="mb-1 text-note font-semibold">{words.findings}</h4>
          <Findings findings={revision.findings} />
        </div>
      )}
      <dl className="grid grid-cols-[auto_1fr] gap-x-3 gap-y-1 text-note">
        <dt className="text-soft">{words.source}</dt>
        <dd className="min-w-0 font-num break-all">{source.fileName}</dd>
        <dt className="text-soft">{words.fingerprint}</dt>
        <dd className="min-w-0 font-num break-all">{source.sha256}</dd>
      </dl>
      <Button icon={<Download size={18} aria-hidden />} onClick={download} className="self-start">
        {words.downloadSource}
      </Button>
    </div>
  );
}
