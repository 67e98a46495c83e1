import type { PositionDto } from '@stayledger/shared/contracts/rig';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { DueWord } from '../../components/part-mark/due-word';
import { PartMark } from '../../components/part-mark/part-mark';
import { standingWord } from '../../components/part-mark/standing-words';
import type { DataTableColumn } from '../../components/tables/data-table';
import type { Formatter } from '../../lib/formatting/format';
import styles from './rig.module.css';

export const LOAD_BASIS_WORDS = {
  measured: 'measured',
  mirrored: 'mirrored from the other side',
  'in-line': 'in line with a measured part',
  none: 'no load basis',
} as const;

interface RigColumnOptions {
  format: Formatter;
  todayOn: string;
  zone: string;
  mayUpdate: boolean;
}

/** Positions in rig order, each with the part in it, its allowance, its dates and where its loads come from. */
export function rigColumns({
  format,
  todayOn,
  zone,
  mayUpdate,
}: RigColumnOptions): DataTableColumn<PositionDto>[] {
  const columns: DataTableColumn<PositionDto>[] = [
    {
      key: 'position',
      title: 'Position and part',
      render: ({ id, label, alias, part }) => (
        <span className={styles.place}>
          {part ? (
            <PartMark standing={part.standing} kindOfWire={part.kindOfWire} />
          ) : (
            <span className={styles.gap} />
          )}
          <span>
            {part ? <Link to={paths.part.to(part.id)}>{label}</Link> : label}
            {alias ? <span className="soft"> {alias}</span> : null}
            <span className={styles.second}>
              {part ? (
                `${part.constructionName}, ${format.diameter(part.diameterMm)}`
              ) : (
                <>
                  No part fitted,{' '}
                  <Link to={paths.positionHistory.to(id)} aria-label={`Earlier parts at ${label}`}>
                    earlier parts
                  </Link>
                </>
              )}
            </span>
          </span>
        </span>
      ),
      value: ({ label }) => label,
    },
    {
      key: 'state',
      title: 'State',
      render: ({ part }) =>
        part ? <DueWord due={part.standing.due}>{standingWord(part.standing)}</DueWord> : <None />,
      value: ({ part }) => (part ? standingWord(part.standing) : null),
    },
    {
      key: 'allowance',
      title: 'Allowance used',
      help: 'allowance used',
      numeric: true,
      render: ({ part }) => format.allowance(part?.standing.allowanceUsed),
      value: ({ part }) => part?.standing.allowanceUsed ?? null,
    },
    {
      key: 'replace-by',
      title: 'Replace by',
      help: 'replace by',
      render: ({ part }) =>
        part?.standing.replaceByOn ? (
          <>
            <DueWord due={part.standing.due}>
              {format.dueDay(part.standing.replaceByOn, todayOn, zone)}
            </DueWord>
            <span className={styles.rule}>
              {part.standing.governingRule === 'calendar' ? 'calendar rule' : 'fatigue allowance'}
            </span>
          </>
        ) : (
          <None />
        ),
      value: ({ part }) => part?.standing.replaceByOn ?? null,
    },
    {
      key: 'basis',
      title: 'Load basis',
      help: 'load basis',
      render: ({ part }) =>
        part ? (
          <>
            {LOAD_BASIS_WORDS[part.standing.loadBasis]}
            <span className={styles.second}>{format.hours(part.standing.loggedHours)} logged</span>
          </>
        ) : (
          <None />
        ),
      value: ({ part }) => (part ? LOAD_BASIS_WORDS[part.standing.loadBasis] : null),
    },
    {
      key: 'breaking-load',
      title: `Breaking load, ${format.forceUnit}`,
      help: 'breaking load',
      numeric: true,
      render: ({ part }) => format.forceFigure(part?.breakingLoadKn),
      value: ({ part }) => (part ? format.forceFromKn(part.breakingLoadKn) : null),
    },
    {
      key: 'fitted',
      title: 'Fitted',
      render: ({ part }) => (part ? part.fittedOn ? format.day(part.fittedOn) : 'not known' : <None />),
      value: ({ part }) => part?.fittedOn ?? null,
    },
  ];
  if (!mayUpdate) return columns;
  return [
    ...columns,
    {
      key: 'steps',
      title: 'Change',
      render: ({ id, vesselId, label, part }) => (
        <span className={styles.steps}>
          {part ? (
            <>
              <Link to={paths.editPart.to(part.id)} aria-label={`Edit the part at ${label}`}>
                Part
              </Link>
              <Link to={paths.removePart.to(part.id)} aria-label={`Take off the part at ${label}`}>
                Take off
              </Link>
            </>
          ) : (
            <Link to={paths.fitPart.to(vesselId, id)} aria-label={`Fit a part at ${label}`}>
              Fit a part
            </Link>
          )}
          <Link to={paths.editPosition.to(vesselId, id)} aria-label={`Edit the position ${label}`}>
            Position
          </Link>
        </span>
      ),
    },
  ];
}

function None() {
  return <span className="soft">–</span>;
}
