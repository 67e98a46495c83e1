import type { CurveDto } from '@stayledger/shared/contracts/curves';
import { useMemo } from 'react';
import { LineChart } from '../../components/charts/line-chart';
import { useFormat } from '../../lib/formatting/use-format';
import { curvePoints } from './curve-points';
import { curveStretches, type CurveStretch } from './curve-stretches';
import { MEASURE_WORDS, measureUnit } from './reference-words';

interface CurveChartProps {
  curve: Pick<CurveDto, 'name' | 'measure' | 'segments' | 'validity' | 'cutOffRange'>;
  csvName: string;
  title?: string;
}

/** A curve on two logarithmic axes: solid where its source supports it, dashed where the line is only carried on. */
export function CurveChart({ curve, csvName, title = 'Range against cycles to failure' }: CurveChartProps) {
  const format = useFormat();
  const { minRange, maxRange } = curve.validity;
  const bounds = useMemo(
    () => [minRange, maxRange].filter((range): range is number => range !== null),
    [minRange, maxRange],
  );
  const points = useMemo(() => curvePoints(curve, bounds), [curve, bounds]);
  const unit = measureUnit(curve.measure);
  const range = `${MEASURE_WORDS[curve.measure]}${unit ? `, ${unit}` : ''}`;
  const rangeTitle = `${range.charAt(0).toUpperCase()}${range.slice(1)}`;
  const figure = (value: number) => `${format.significant(value, 3)}${unit ? `\u00a0${unit}` : ''}`;
  return (
    <LineChart
      title={title}
      headingLevel={2}
      description={`${validityWords(minRange, maxRange, figure)} Both axes are logarithmic: one step to the left is a tenth of the life.`}
      series={supportedFirst(curveStretches(points, curve.validity)).map((stretch, index) => ({
        id: `${stretch.kind}-${index}`,
        label: stretch.kind === 'supported' ? curve.name : 'beyond what the source supports',
        stroke: stretch.kind === 'supported' ? 'solid' : 'dashed',
        points: stretch.points.map(({ range: y, cycles: x }) => ({ x, y })),
      }))}
      markers={[
        ...bounds.map((value) => ({
          axis: 'y' as const,
          value,
          label: value === maxRange ? 'highest range supported' : 'lowest range supported',
          kind: 'rule' as const,
          // A falling line leaves the upper right and the lower left free.
          labelAt: value === maxRange ? ('top-right' as const) : ('bottom-left' as const),
        })),
        ...(curve.cutOffRange === null
          ? []
          : [
              {
                axis: 'y' as const,
                value: curve.cutOffRange,
                label: 'cut-off',
                kind: 'rule' as const,
                labelAt: 'bottom-left' as const,
              },
            ]),
      ]}
      xScale="log"
      yScale="log"
      xTitle="Cycles to failure"
      yTitle={rangeTitle}
      formatX={(x) => format.powerOfTen(Number(x))}
      formatY={(y) => format.significant(y, 3)}
      rows={points}
      rowKey={(point) => String(point.range)}
      columns={[
        {
          key: 'range',
          title: rangeTitle,
          numeric: true,
          render: (point) => format.significant(point.range, 4),
          value: (point) => point.range,
        },
        {
          key: 'cycles',
          title: 'Cycles to failure',
          numeric: true,
          render: (point) => format.scientific(point.cycles, 4),
          value: (point) => point.cycles,
        },
        {
          key: 'supported',
          title: 'Supported by the source',
          render: (point) => supportWords(point.range, minRange, maxRange),
          value: (point) => supportWords(point.range, minRange, maxRange),
        },
      ]}
      csvName={csvName}
      emptyText="This curve has no part between ten thousand and a thousand million cycles."
    />
  );
}

/** The first series is drawn in full ink. */
function supportedFirst(stretches: CurveStretch[]): CurveStretch[] {
  return [...stretches].sort((a, b) => Number(a.kind === 'beyond') - Number(b.kind === 'beyond'));
}

function validityWords(
  minRange: number | null,
  maxRange: number | null,
  figure: (value: number) => string,
): string {
  if (minRange !== null && maxRange !== null) {
    return `The source supports ranges from ${figure(minRange)} to ${figure(maxRange)}; dashed, the line is carried on beyond them.`;
  }
  if (maxRange !== null)
    return `The source supports ranges up to ${figure(maxRange)}; dashed, the line is carried on above.`;
  if (minRange !== null)
    return `The source supports ranges from ${figure(minRange)}; dashed, the line is carried on below.`;
  return 'The source states no bounds of the range.';
}

function supportWords(range: number, minRange: number | null, maxRange: number | null): string {
  if (minRange === null && maxRange === null) return 'no bounds stated';
  return range >= (minRange ?? 0) && range <= (maxRange ?? Number.POSITIVE_INFINITY) ? 'yes' : 'no';
}
