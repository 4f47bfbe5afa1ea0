import type { RoleDeclaration } from '../kit/calculator.js';

const holdStill =
  'Hold the driver firmly by its magnet or frame, away from walls and benches, rear vent free. Clip the leads at the terminals and check them first.';

export const roles = {
  'free-air': {
    label: 'Free air',
    help: `${holdStill} Use a small level, and the same level for every sweep that belongs together.`,
    least: 1,
    most: 1,
    needs: 'sweep',
    keys: {},
  },
  'added-mass': {
    label: 'Added mass',
    help: `${holdStill} Weigh the mass first, then fix it evenly around the dust cap. Same position and level as in free air. A mass that lowers fs by 20 to 50 % is common practice.`,
    least: 0,
    most: 20,
    needs: 'sweep',
    keys: {
      mass: { label: 'Mass', unit: 'kg', required: true },
      massUncertainty: { label: 'Mass uncertainty', unit: 'kg', required: false, allowsZero: true },
    },
  },
  'known-volume': {
    label: 'Known volume',
    help: 'An unlined, airtight test box; seal the driver to it. Give the net volume: less the driver and bracing, with the cone’s cavity if the cone looks outwards. Same level as in free air.',
    least: 0,
    most: 1,
    needs: 'sweep',
    keys: {
      volume: { label: 'Net volume', unit: 'm³', required: true },
      volumeUncertainty: { label: 'Volume uncertainty', unit: 'm³', required: false, allowsZero: true },
    },
  },
} as const satisfies Record<string, RoleDeclaration>;
