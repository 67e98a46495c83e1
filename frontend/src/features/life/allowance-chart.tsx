import type { PartLifeDto } from '@stayledger/shared/contracts/life';
import { LineChart } from '../../components/charts/line-chart';
import type { ChartMarker } from '../../components/charts/line-chart-drawing';
import type { DataTableColumn } from '../../components/tables/data-table';
import { useFormat } from '../../lib/formatting/use-format';
import { usedSoFar } from './allowance-series';

interface Row {
  on: string;
  allowance: number;
  kind: 'used' | 'forecast';
}

/** The account of the governing detail: used until today, then as planned, against the ruled line of the allowance. */
export function AllowanceChart({ life, zone }: { life: PartLifeDto; zone: string }) {
  const format = useFormat();
  const used = usedSoFar(life);
  const { forecast } = life;
  const rows: Row[] = [
    ...used.map((point): Row => ({ ...point, kind: 'used' })),
    ...forecast.map((point): Row => ({ ...point, kind: 'forecast' })),
  ];
  const lastOn = rows[rows.length - 1]?.on ?? '';
  const highest = Math.max(0, ...rows.map((row) => row.allowance));
  const { replaceByOn } = life.standing;
  const markers: ChartMarker[] = [];
  // Far below the allowance, its line would press the whole account flat against the axis; the words still name it.
  const showsRule = highest > 0.1;
  if (showsRule) markers.push({ axis: 'y', value: 1, label: 'The whole allowance', kind: 'rule' });
  if (replaceByOn !== null && replaceByOn <= lastOn) {
    markers.push({ axis: 'x', value: replaceByOn, label: 'Replace by', kind: 'flag' });
  }
  const columns: DataTableColumn<Row>[] = [
    { key: 'on', title: 'Day', render: (row) => format.day(row.on), value: (row) => row.on },
    {
      key: 'kind',
      title: 'From',
      render: (row) => (row.kind === 'used' ? 'recorded' : 'planned sailing'),
      value: (row) => row.kind,
    },
    {
      key: 'allowance',
      title: 'Allowance used',
      numeric: true,
      render: (row) => format.allowance(row.allowance),
      value: (row) => row.allowance,
    },
  ];
  return (
    <LineChart
      title="Allowance used"
      description={
        forecast.length > 0
          ? `The line runs to ${format.day(life.asOfOn)}; the dashes go on at the planned sailing. Their spread is not computed yet: take them as one line through an uncertain future.`
          : `Allowance used by ${standingName(life)}, day by day of the recordings.`
      }
      series={[
        { id: 'used', label: 'Used', points: used.map((point) => ({ x: point.on, y: point.allowance })) },
        {
          id: 'forecast',
          label: 'At the planned sailing',
          stroke: 'dashed',
          points: forecast.map((point) => ({ x: point.on, y: point.allowance })),
        },
      ]}
      xScale="day"
      xTitle={`Day (${zone})`}
      yTitle="Allowance used, %"
      yMin={0}
      yMax={showsRule ? Math.max(1.1, highest * 1.05) : 'auto'}
      formatX={(x) => (typeof x === 'string' ? monthOf(format.day(x)) : '')}
      formatY={(y) => format.percent(y, highest < 0.05 ? 1 : 0)}
      markers={markers}
      xTicks={fewDays(rows.map((row) => row.on))}
      rows={rows}
      columns={columns}
      rowKey={(row) => `${row.kind}-${row.on}`}
      csvName="allowance-used"
      emptyText="Once a load log is posted to the ledger, the account of this part stands here day by day."
    />
  );
}

function standingName(life: PartLifeDto): string {
  return life.standing.governingDetail === null
    ? 'the governing detail'
    : `“${life.standing.governingDetail}”`;
}

/** "14 Mar 2027" without its day: a tick marks about a month. */
function monthOf(day: string): string {
  return day.split('\u00a0').slice(1).join('\u00a0');
}

const DAY_MS = 86_400_000;
const TICKS = 3;

/** First, middle and last day of the chart: three dates fit on a phone too. */
function fewDays(days: readonly string[]): string[] {
  if (days.length === 0) return [];
  const sorted = [...days].sort();
  const from = Date.parse(sorted[0]);
  const to = Date.parse(sorted[sorted.length - 1]);
  const ticks = Array.from({ length: TICKS }, (_, index) => {
    const ms = from + Math.round(((to - from) * index) / (TICKS - 1) / DAY_MS) * DAY_MS;
    return new Date(ms).toISOString().slice(0, 10);
  });
  return [...new Set(ticks)];
}
