import type { PartLifeDto } from '@stayledger/shared/contracts/life';
import { LineChart } from '../../components/charts/line-chart';
import type { DataTableColumn } from '../../components/tables/data-table';
import { useFormat } from '../../lib/formatting/use-format';

type Bin = PartLifeDto['cycles']['bins'][number];

/** Counted cycles beside the curve they are judged by, both axes in powers of ten. */
export function CyclesChart({ life }: { life: PartLifeDto }) {
  const format = useFormat();
  const { bins, curvePoints, measureUnit } = life.cycles;
  const counted = bins.filter((bin) => bin.cycles > 0 && middle(bin) > 0);
  const curve = curvePoints.filter(
    ({ cyclesToFailure, range }) => Number.isFinite(cyclesToFailure) && range > 0,
  );
  const unit = measureUnit === '' ? '' : `, ${measureUnit}`;
  const columns: DataTableColumn<Bin>[] = [
    {
      key: 'range',
      title: `Range${unit}`,
      render: (bin) => `${format.significant(bin.rangeLow, 3)} to ${format.significant(bin.rangeHigh, 3)}`,
      value: (bin) => middle(bin),
    },
    {
      key: 'cycles',
      title: 'Cycles counted',
      numeric: true,
      render: (bin) => format.number(bin.cycles, bin.cycles % 1 === 0 ? 0 : 1),
      value: (bin) => bin.cycles,
    },
    {
      key: 'share',
      title: 'Share of the damage',
      numeric: true,
      render: (bin) => format.percent(bin.damageShare),
      value: (bin) => bin.damageShare,
    },
  ];
  return (
    <LineChart
      title="Cycles against the curve"
      description="Squares: cycles counted so far, by their range. Line: how many cycles of that range the curve allows. The closer a square comes to the line, the more of the allowance it uses."
      series={[
        {
          id: 'curve',
          label: 'Curve',
          points: curve.map(({ cyclesToFailure, range }) => ({ x: cyclesToFailure, y: range })),
        },
        {
          id: 'counted',
          label: 'Counted',
          stroke: 'none',
          showPoints: true,
          points: counted.map((bin) => ({ x: bin.cycles, y: middle(bin) })),
        },
      ]}
      xScale="log"
      yScale="log"
      xTitle="Cycles"
      yTitle={`Range${unit}`}
      formatX={(x) => format.scientific(Number(x), 1)}
      formatY={(y) => format.number(y, y < 1 ? 2 : 0)}
      rows={counted}
      columns={columns}
      rowKey={(bin) => String(bin.rangeLow)}
      csvName="cycles-against-curve"
      emptyText="Once a load log is posted, its cycles stand here against the curve of the governing detail."
    />
  );
}

function middle(bin: Bin): number {
  return (bin.rangeLow + bin.rangeHigh) / 2;
}
