import type { PartOfPositionDto } from '@stayledger/shared/contracts/position-history';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { PartMark } from '../../components/part-mark/part-mark';
import type { DataTableColumn } from '../../components/tables/data-table';
import type { Formatter } from '../../lib/formatting/format';

/** The parts a position has had: when each was there, why it came off, and how its account stood. */
export function partHistoryColumns(format: Formatter): DataTableColumn<PartOfPositionDto>[] {
  return [
    {
      key: 'part',
      title: 'Part',
      render: (part) => (
        <>
          <PartMark standing={asShown(part)} kindOfWire={part.kindOfWire} />{' '}
          <Link to={paths.part.to(part.id)}>
            {part.constructionName}, {format.diameter(part.diameterMm)}
          </Link>
        </>
      ),
      value: (part) => `${part.constructionName}, ${part.diameterMm} mm`,
    },
    {
      key: 'fitted',
      title: 'Fitted',
      render: (part) => (part.fittedOn === null ? 'not known' : format.day(part.fittedOn)),
      value: (part) => part.fittedOn,
    },
    {
      key: 'removed',
      title: 'Taken off',
      render: (part) => (part.removedOn === null ? 'in place' : format.day(part.removedOn)),
      value: (part) => part.removedOn ?? 'in place',
    },
    {
      key: 'reason',
      title: 'Why',
      render: (part) => part.removedReason ?? '–',
      value: (part) => part.removedReason,
    },
    {
      key: 'used',
      title: 'Allowance used',
      help: 'allowance used',
      numeric: true,
      render: (part) =>
        part.standing.allowanceUsed === null ? 'not assessed' : format.allowance(part.standing.allowanceUsed),
      value: (part) => part.standing.allowanceUsed,
    },
    {
      key: 'hours',
      title: 'Logged',
      numeric: true,
      render: (part) => format.hours(part.standing.loggedHours),
      value: (part) => part.standing.loggedHours,
    },
    {
      key: 'entries',
      title: 'Entries',
      numeric: true,
      render: (part) => format.number(part.entries),
      value: (part) => part.entries,
    },
    {
      key: 'batch',
      title: 'Batch',
      render: (part) => (part.batch === '' ? '–' : part.batch),
      value: (part) => part.batch,
    },
  ];
}

/** Nothing is due of a part that came off. */
function asShown({ standing, removedOn }: PartOfPositionDto): PartOfPositionDto['standing'] {
  return removedOn === null ? standing : { ...standing, due: 'no-date' };
}
