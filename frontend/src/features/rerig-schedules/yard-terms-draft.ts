import type { YardTermsDto } from '@stayledger/shared/contracts/yard-terms';
import { parseNumber } from '../../lib/formatting/format';
import { minorPerUnit } from './schedule-words';

type Terms = YardTermsDto['terms'];

/** One figure of the terms as a form shows it. */
export interface TermsField {
  path: string;
  label: string;
  /** Stored value is what is shown times this: money in minor units, shares in percent. */
  scale: number;
  /** Stored as a whole number: money. */
  whole: boolean;
}

const VISITS = [
  ['aloft', 'Aloft, mast up'],
  ['mast-out-afloat', 'Mast out, afloat'],
  ['mast-out-ashore', 'Mast out, ashore'],
] as const;
const WIRES = [
  ['strand', 'Strand'],
  ['rod', 'Rod'],
  ['fibre', 'Fibre'],
] as const;

/** Groups of figures, in the order they are read. */
export function termsGroups(currency: string): { title: string; fields: TermsField[] }[] {
  const scale = minorPerUnit(currency);
  const money = (path: string, label: string): TermsField => ({
    path,
    label: `${label}, ${currency}`,
    scale,
    whole: true,
  });
  const plain = (path: string, label: string): TermsField => ({ path, label, scale: 1, whole: false });
  return [
    ...VISITS.map(([kind, title]) => ({
      title: `Visit: ${title.toLowerCase()}`,
      fields: [
        money(`visits.${kind}.costMinor`, 'Cost of the visit'),
        plain(`visits.${kind}.hours`, 'Rigger hours'),
      ],
    })),
    ...WIRES.map(([kind, title]) => ({
      title: `${title}: replacing one part`,
      fields: [
        money(`replacements.${kind}.perPartMinor`, 'For the part'),
        money(`replacements.${kind}.perMetreMillimetreMinor`, 'For each metre and mm of diameter'),
        plain(`replacements.${kind}.hours`, 'Rigger hours, mast out'),
        plain(`replacements.${kind}.leadDays`, 'Days to get the material'),
      ],
    })),
    {
      title: 'Inspection of the whole rig',
      fields: [
        money('inspection.costMinor', 'Cost'),
        plain('inspection.hours', 'Rigger hours'),
        plain('inspectionEveryMonths', 'Every so many months (0: none)'),
      ],
    },
    {
      title: 'Margins',
      fields: [
        { path: 'contingencyShare', label: 'Set aside with the mast out, %', scale: 0.01, whole: false },
        plain('orderMarginDays', 'Days kept before ordering late'),
      ],
    },
  ];
}

/** A figure of the terms by its path. */
export function figureAt(terms: Terms, path: string): number {
  let found: unknown = terms;
  for (const key of path.split('.')) found = (found as Record<string, unknown>)[key];
  return found as number;
}

/** The terms with the figures that were written; a figure that cannot be read becomes none, which the contract refuses. */
export function withFigures(
  terms: Terms,
  fields: readonly TermsField[],
  texts: Record<string, string>,
): unknown {
  const changed = structuredClone(terms) as unknown as Record<string, unknown>;
  for (const { path, scale, whole } of fields) {
    const figure = parseNumber(texts[path] ?? '');
    const keys = path.split('.');
    const last = keys.pop() ?? '';
    let into = changed;
    for (const key of keys) into = into[key] as Record<string, unknown>;
    // Cents do not come out of a product of decimals exactly.
    into[last] = figure === null ? null : whole ? Math.round(figure * scale) : figure * scale;
  }
  return changed;
}
