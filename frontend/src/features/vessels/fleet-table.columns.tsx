import type { FleetRowDto } from '@stayledger/shared/contracts/vessels';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { DueWord } from '../../components/part-mark/due-word';
import { PartMark } from '../../components/part-mark/part-mark';
import type { DataTableColumn } from '../../components/tables/data-table';
import { clock } from '../../lib/clock';
import type { Formatter } from '../../lib/formatting/format';
import styles from './fleet.module.css';
import { countWords, dueWords, RIG_TYPE_WORDS, RULE_WORDS, USE_KIND_WORDS } from './vessel-words';

/** One row a vessel: what governs it, how much of the picture is missing, and what was recorded. */
export function fleetColumns(format: Formatter): DataTableColumn<FleetRowDto>[] {
  return [
    {
      key: 'name',
      title: 'Vessel',
      render: (row) => (
        <>
          <Link to={paths.vessel.to(row.id)}>{row.name}</Link>
          <div className="soft">
            {[RIG_TYPE_WORDS[row.rigType], USE_KIND_WORDS[row.useKind].toLowerCase(), row.homePort]
              .filter(Boolean)
              .join(', ')}
          </div>
        </>
      ),
      value: (row) => row.name,
    },
    {
      key: 'governing',
      title: 'What comes first',
      help: 'replace by',
      render: (row) =>
        row.governing ? (
          <span className={styles.governing}>
            <PartMark standing={row.governing} kindOfWire={row.governing.kindOfWire} />
            <span>
              <Link to={paths.part.to(row.governing.partId)}>{row.governing.positionLabel}</Link>
              <span className={styles.rule}>
                <DueWord due={row.governing.due}>
                  {dueWords(row.governing, format, clock.todayOn(row.zone))}
                </DueWord>
                <span className="soft">, {RULE_WORDS[row.governing.rule]}</span>
              </span>
            </span>
          </span>
        ) : (
          <span className="soft">No date yet</span>
        ),
      value: (row) => row.governing?.replaceByOn ?? null,
    },
    {
      key: 'allowance',
      title: 'Allowance used',
      help: 'allowance used',
      numeric: true,
      render: (row) => format.allowance(row.governing?.allowanceUsed),
      value: (row) => row.governing?.allowanceUsed ?? null,
    },
    {
      key: 'parts',
      title: 'Parts',
      render: (row) => countWords(row.counts),
      value: (row) => row.counts.parts,
    },
    {
      key: 'logs',
      title: 'Logged',
      numeric: true,
      render: (row) => (
        <>
          {format.hours(row.loggedHours)}
          <div className="soft">
            {row.lastLogAt ? `to ${format.instant(row.lastLogAt, row.zone).split(',')[0]}` : 'no log yet'}
          </div>
        </>
      ),
      value: (row) => row.loggedHours,
    },
    {
      key: 'waiting',
      title: 'Waiting',
      render: (row) =>
        row.counts.logsWaiting > 0 ? (
          <Link to={paths.loadLogs.to(row.id)}>
            {row.counts.logsWaiting === 1 ? '1 log to review' : `${row.counts.logsWaiting} logs to review`}
          </Link>
        ) : (
          <span className="soft">–</span>
        ),
      value: (row) => row.counts.logsWaiting,
    },
  ];
}
