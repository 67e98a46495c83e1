import type { CurveSpreadDto } from '@stayledger/shared/contracts/curve-spread';
import type { CurveDto } from '@stayledger/shared/contracts/curves';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { DataTable, type DataTableColumn } from '../../components/tables/data-table';
import type { Formatter } from '../../lib/formatting/format';
import { useFormat } from '../../lib/formatting/use-format';

type Row = CurveSpreadDto['items'][number];

const LEVEL_SHORT: Record<CurveDto['level'], string> = {
  mean: 'mean of the tests',
  'mean-minus-k-sd': 'design curve',
  'fractile-95-75': 'design curve',
  unknown: 'not stated',
};

/** The wire's own history on every strand curve: how far the standards lie apart, instead of one figure. */
export function CurveSpread({ spread }: { spread: CurveSpreadDto }) {
  const format = useFormat();
  const { items, loggedHours } = spread;
  if (items.length === 0) {
    return (
      <p>There is nothing to set side by side: no log was posted, or no strand curve speaks of this wire.</p>
    );
  }
  const [most, least] = [items[0].allowance, items[items.length - 1].allowance];
  return (
    <>
      <p>
        The free length of this wire in {format.hours(loggedHours)} logged, on each strand curve there is.{' '}
        {least > 0 &&
          `The curves lie apart by a factor of ${format.number(most / least, most / least < 10 ? 1 : 0)}. `}
        None was measured on stainless yacht wire, and they are not all drawn at the same level. The spread is
        what is known; no curve here is the true one.
      </p>
      <DataTable
        caption="Strand curves side by side"
        rows={items}
        columns={columns(format, items.find(({ isUsed }) => isUsed)?.allowance ?? 0)}
        rowKey={(row) => row.curveId}
      />
    </>
  );
}

/** @param own allowance by the curve of the account; 0 where it is kept on none of these */
function columns(format: Formatter, own: number): DataTableColumn<Row>[] {
  return [
    {
      key: 'curve',
      title: 'Curve',
      render: (row) => (
        <>
          <Link to={paths.curve.to(row.curveId)}>{row.curveName}</Link>
          {row.isUsed ? ' (this account)' : ''}
        </>
      ),
      value: (row) => row.curveName,
    },
    {
      key: 'level',
      title: 'Level',
      render: (row) => LEVEL_SHORT[row.level],
      value: (row) => LEVEL_SHORT[row.level],
    },
    {
      key: 'allowance',
      title: 'Allowance used',
      numeric: true,
      render: (row) => format.allowance(row.allowance),
      value: (row) => row.allowance,
    },
    {
      key: 'beside',
      title: 'Times this account',
      numeric: true,
      render: (row) => (own > 0 ? format.number(row.allowance / own, 2) : '–'),
      value: (row) => (own > 0 ? row.allowance / own : null),
    },
  ];
}
