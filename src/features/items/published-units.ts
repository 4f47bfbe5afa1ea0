import type { Item } from '../../../shared/contracts/item.js';
import { text } from '../../../shared/text.js';

/** The figures a maker prints, with their SI unit, by kind of item. */
const UNITS = {
  fs: 'Hz',
  Re: 'Ω',
  ratedZ: 'Ω',
  Qts: '1',
  Qes: '1',
  Qms: '1',
  Vas: 'm³',
  Sd: 'm²',
  Dd: 'm',
  Mms: 'kg',
  Cms: 'm/N',
  Bl: 'T·m',
  Le1k: 'H',
  Vb: 'm³',
  fb: 'Hz',
  R: 'Ω',
  L: 'H',
  C: 'F',
} as const satisfies Record<keyof typeof text.project.figures, string>;
export type PublishedId = keyof typeof UNITS;

const BY_KIND: Record<Item['kind'], readonly PublishedId[]> = {
  driver: ['fs', 'Re', 'ratedZ', 'Qts', 'Qes', 'Qms', 'Vas', 'Sd', 'Dd', 'Mms', 'Cms', 'Bl', 'Le1k'],
  box: ['Vb', 'fb'],
  part: ['R', 'L', 'C'],
  jig: ['R'],
};

export function publishedIds(kind: Item['kind']): readonly PublishedId[] {
  return BY_KIND[kind];
}
export function unitOfPublished(id: PublishedId): string {
  return UNITS[id];
}
export function figureName(id: string): string {
  const names: Readonly<Record<string, string>> = text.project.figures;
  return names[id] ?? id;
}
