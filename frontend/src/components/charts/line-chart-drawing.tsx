import { ResponsiveLine, type LineCustomSvgLayer, type LineSeries, type PointTooltipProps } from '@nivo/line';
import { useColourMode } from '../../theme/colour-mode';
import { nivoTheme } from '../../theme/nivo-theme';
import styles from './charts.module.css';
import { logAxis } from './log-axis';

/** Days are 'YYYY-MM-DD', instants epoch milliseconds, numbers plain. */
export type ChartX = string | number;
/** `none` leaves the points alone: values that no line joins, such as counts per range. */
export type LineStroke = 'solid' | 'dashed' | 'dotted' | 'rule' | 'none';

export interface ChartSeries {
  id: string;
  /** Direct label, and the name in the hover text. */
  label: string;
  points: { x: ChartX; y: number | null }[];
  stroke?: LineStroke;
  /** Small squares at the points, for measured values far apart. */
  showPoints?: boolean;
}

export interface ChartMarker {
  axis: 'x' | 'y';
  value: ChartX;
  label: string;
  /** `flag` is rust and means due or overdue; `rule` is a ruled ink line. */
  kind: 'rule' | 'flag';
  /** Where the label of a level (axis y) stands, so that it keeps clear of the line. */
  labelAt?: 'top-left' | 'top-right' | 'bottom-left';
}

export interface LineChartCanvasProps {
  series: ChartSeries[];
  /** day: x are 'YYYY-MM-DD'; instant: epoch ms; number; log: number on a logarithmic axis. */
  xScale: 'day' | 'instant' | 'number' | 'log';
  yScale?: 'number' | 'log';
  /** Axis titles with their unit: "Stress range, MPa". */
  xTitle: string;
  yTitle: string;
  yMin?: number | 'auto';
  yMax?: number | 'auto';
  formatX: (x: ChartX) => string;
  formatY: (y: number) => string;
  markers?: ChartMarker[];
  /** Values of the ticks on x and y, where the automatic ones do not serve. */
  xTicks?: ChartX[];
  yTicks?: number[];
  /** More layers, below the lines, in nivo's own custom-layer form. */
  layersBelow?: LineCustomSvgLayer<NivoSeries>[];
  layersAbove?: LineCustomSvgLayer<NivoSeries>[];
}

export interface NivoSeries extends LineSeries {
  id: string;
  label: string;
  stroke: LineStroke;
  showPoints: boolean;
  data: { x: number; y: number | null }[];
}

/** Lines as SVG through nivo; days are placed as UTC midnights so that no zone moves them. */
export function LineChartDrawing({
  series,
  xScale,
  yScale = 'number',
  xTitle,
  yTitle,
  yMin = 'auto',
  yMax = 'auto',
  formatX,
  formatY,
  markers = [],
  xTicks,
  yTicks,
  layersBelow = [],
  layersAbove = [],
}: LineChartCanvasProps) {
  const { mode, colours } = useColourMode();
  const toNumber = (x: ChartX) => (typeof x === 'number' ? x : Date.parse(`${x}T00:00:00Z`));
  const fromNumber = (value: number): ChartX =>
    xScale === 'day' ? new Date(value).toISOString().slice(0, 10) : value;
  const inks = [colours.ink, colours.ramp[3], colours.ramp[4], colours.ramp[2]];
  const data: NivoSeries[] = series.map((one) => ({
    id: one.id,
    label: one.label,
    stroke: one.stroke ?? 'solid',
    showPoints: one.showPoints ?? false,
    data: one.points.map((point) => ({ x: toNumber(point.x), y: point.y })),
  }));
  const inkOf = (id: string) => inks[series.findIndex((one) => one.id === id) % inks.length];
  // Of itself a logarithmic axis takes its ends from the first and last point, whichever way the data run.
  const logX = xScale === 'log' ? logAxis(data.flatMap((one) => one.data.map((point) => point.x))) : null;
  const logY =
    yScale === 'log' ? logAxis(data.flatMap((one) => one.data.map((point) => point.y ?? 0))) : null;

  return (
    <ResponsiveLine<NivoSeries>
      // The figure around it is the image; its text says what the drawing shows.
      role="presentation"
      data={data}
      theme={nivoTheme(mode)}
      colors={(one) => inkOf(String(one.id))}
      margin={{ top: 24, right: 32, bottom: 52, left: 64 }}
      xScale={
        xScale === 'log'
          ? { type: 'log', base: 10, min: logX?.min ?? 'auto', max: logX?.max ?? 'auto', nice: false }
          : { type: 'linear', min: 'auto', max: 'auto' }
      }
      yScale={
        yScale === 'log'
          ? { type: 'log', base: 10, min: logY?.min ?? 'auto', max: logY?.max ?? 'auto', nice: false }
          : { type: 'linear', min: yMin, max: yMax, nice: yMax === 'auto' }
      }
      enableGridX={false}
      gridYValues={yTicks ?? logY?.ticks ?? 5}
      axisBottom={{
        tickSize: 4,
        tickPadding: 6,
        tickValues: xTicks?.map(toNumber) ?? logX?.ticks ?? 5,
        format: (value) => formatX(fromNumber(Number(value))),
        legend: xTitle,
        legendOffset: 42,
        legendPosition: 'middle',
      }}
      axisLeft={{
        tickSize: 4,
        tickPadding: 6,
        tickValues: yTicks ?? logY?.ticks ?? 5,
        format: (value) => formatY(Number(value)),
        legend: yTitle,
        legendOffset: -54,
        legendPosition: 'middle',
      }}
      enablePoints={false}
      animate={false}
      useMesh
      enableCrosshair
      crosshairType="x"
      markers={markers.map((marker) => ({
        axis: marker.axis,
        value: marker.axis === 'x' ? toNumber(marker.value) : Number(marker.value),
        legend: marker.label,
        legendPosition: marker.axis === 'x' ? 'top' : (marker.labelAt ?? 'top-left'),
        lineStyle: {
          stroke: marker.kind === 'flag' ? colours.rust : colours.ink,
          strokeWidth: marker.kind === 'flag' ? 2 : 1,
        },
        textStyle: { fill: marker.kind === 'flag' ? colours.rust : colours.ink, fontSize: 12 },
      }))}
      layers={[
        'grid',
        'axes',
        ...layersBelow,
        'markers',
        strokedLines,
        pointMarks,
        ...layersAbove,
        'crosshair',
        'mesh',
      ]}
      tooltip={({ point }: PointTooltipProps<NivoSeries>) => (
        <div className={styles.tooltip}>
          {formatX(fromNumber(Number(point.data.x)))}: {formatY(Number(point.data.y))}
          <span> {series.find((one) => one.id === point.seriesId)?.label}</span>
        </div>
      )}
    />
  );
}

const DASHES: Record<LineStroke, string | undefined> = {
  solid: undefined,
  dashed: '6 4',
  dotted: '1 4',
  rule: undefined,
  none: undefined,
};

/** Lines told apart by their stroke, so that colour never carries the meaning alone. */
const strokedLines: LineCustomSvgLayer<NivoSeries> = ({ data, series, lineGenerator, xScale, yScale }) =>
  series.map((one) => {
    const stroke = data.find((given) => given.id === one.id)?.stroke ?? 'solid';
    if (stroke === 'none') return null;
    const places = one.data.flatMap(({ data: { x, y } }) =>
      y === null ? [] : [{ x: xScale(x), y: yScale(y) }],
    );
    return (
      <path
        key={one.id}
        d={lineGenerator(places) ?? ''}
        fill="none"
        stroke={one.color}
        strokeWidth={stroke === 'rule' ? 1 : 2}
        strokeDasharray={DASHES[stroke]}
        strokeLinecap="round"
        strokeLinejoin="round"
      />
    );
  });

const POINT_PX = 7;

/** Small squares at the values of the series that ask for them, and of no other. */
const pointMarks: LineCustomSvgLayer<NivoSeries> = ({ data, series, xScale, yScale }) =>
  series
    .filter((one) => data.find((given) => given.id === one.id)?.showPoints)
    .flatMap((one) =>
      one.data.map(({ data: { x, y } }, index) =>
        y === null ? null : (
          <rect
            key={`${one.id}-${index}`}
            x={xScale(x) - POINT_PX / 2}
            y={yScale(y) - POINT_PX / 2}
            width={POINT_PX}
            height={POINT_PX}
            fill="var(--sheet)"
            stroke={one.color}
            strokeWidth={1.5}
          />
        ),
      ),
    );
