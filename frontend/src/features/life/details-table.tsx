import type { PartLifeDto } from '@stayledger/shared/contracts/life';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { DataTable, type DataTableColumn } from '../../components/tables/data-table';
import type { Formatter } from '../../lib/formatting/format';
import { useFormat } from '../../lib/formatting/use-format';
import styles from './part-life.module.css';

type Detail = PartLifeDto['details'][number];

/** Places on the part that can fail by themselves, the one that governs first. A part is as good as its worst detail. */
export function DetailsTable({ life, zone }: { life: PartLifeDto; zone: string }) {
  const format = useFormat();
  const rows = [...life.details].sort((a, b) => (b.allowanceUsed ?? -1) - (a.allowanceUsed ?? -1));
  return (
    <DataTable
      caption="Details of this part"
      rows={rows}
      columns={columns(life, format, zone)}
      rowKey={(detail) => detail.detailId}
    />
  );
}

function columns(life: PartLifeDto, format: Formatter, zone: string): DataTableColumn<Detail>[] {
  return [
    {
      key: 'name',
      title: 'Detail',
      render: (detail) => (
        <>
          <strong>{detail.name}</strong>
          <p className={styles.note}>{detail.explanation}</p>
          {detail.estimates.map((estimate) => (
            <p key={estimate} className={styles.note}>
              Estimate: {estimate}
            </p>
          ))}
        </>
      ),
      value: (detail) => detail.name,
    },
    {
      key: 'used',
      title: 'Allowance used',
      numeric: true,
      render: (detail) =>
        detail.allowanceUsed === null ? 'not assessed' : format.allowance(detail.allowanceUsed),
      value: (detail) => detail.allowanceUsed,
    },
    {
      key: 'date',
      title: 'Used up by',
      numeric: true,
      render: (detail) =>
        detail.replaceByOn === null ? '–' : format.dueDay(detail.replaceByOn, life.asOfOn, zone),
      value: (detail) => detail.replaceByOn,
    },
    {
      key: 'factor',
      title: 'Design fatigue factor',
      numeric: true,
      render: (detail) =>
        format.number(detail.designFatigueFactor, Number.isInteger(detail.designFatigueFactor) ? 0 : 1),
      value: (detail) => detail.designFatigueFactor,
    },
    {
      key: 'curve',
      title: 'Curve',
      render: (detail) =>
        detail.curveId === null ? (
          'none that serves'
        ) : (
          <Link to={paths.curve.to(detail.curveId)}>
            {detail.curveName ?? detail.curveId}, version {detail.curveVersion}
          </Link>
        ),
      value: (detail) => detail.curveName,
    },
  ];
}
