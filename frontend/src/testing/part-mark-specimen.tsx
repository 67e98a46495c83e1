import type { ComponentProps } from 'react';
import { PartMark } from '../components/part-mark/part-mark';
import type { MarkedStanding, PartCondition } from '../components/part-mark/standing-words';

export const SPECIMEN_SIZES = [18, 24, 48, 160] as const;

interface MarkState extends PartCondition {
  name: string;
  standing: MarkedStanding;
}

const assessed = (allowanceUsed: number, due: MarkedStanding['due'] = 'in-date'): MarkedStanding => ({
  assessment: 'assessed',
  allowanceUsed,
  due,
});

/** Every state a part mark can show, each once. */
export const PART_MARK_STATES: readonly MarkState[] = [
  { name: 'unused', standing: assessed(0.02) },
  { name: 'one eighth', standing: assessed(0.13) },
  { name: 'half', standing: assessed(0.5) },
  { name: 'seven eighths', standing: assessed(0.9) },
  { name: 'due', standing: assessed(0.75, 'due') },
  { name: 'overdue', standing: assessed(0.75, 'overdue') },
  { name: 'used up', standing: assessed(1.4, 'overdue') },
  { name: 'provisional', standing: assessed(0.5), provisional: true },
  {
    name: 'not assessed',
    standing: { assessment: 'not-assessed', allowanceUsed: null, due: 'in-date' },
  },
  {
    name: 'not assessed, overdue',
    standing: { assessment: 'not-assessed', allowanceUsed: null, due: 'overdue' },
  },
  {
    name: 'calendar only',
    standing: { assessment: 'calendar-only', allowanceUsed: null, due: 'in-date' },
  },
  { name: 'failed inspection', standing: assessed(0.5), failed: true },
  { name: 'suspended', standing: assessed(0.5), suspended: true },
];

/** All states beside each other at every size: for specs and for looking at. */
export function PartMarkSpecimen({ kindOfWire }: Pick<ComponentProps<typeof PartMark>, 'kindOfWire'>) {
  return (
    <div>
      {PART_MARK_STATES.map(({ name, standing, ...condition }) => (
        <p key={name}>
          {SPECIMEN_SIZES.map((size) => (
            <PartMark key={size} standing={standing} kindOfWire={kindOfWire} size={size} {...condition} />
          ))}{' '}
          {name}
        </p>
      ))}
    </div>
  );
}
