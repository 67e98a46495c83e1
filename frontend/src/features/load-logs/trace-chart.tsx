import type { LogFindingDto, LogReviewDto } from '@stayledger/shared/contracts/load-logs';
import { useId, useMemo, type KeyboardEvent, type PointerEvent } from 'react';
import type { Formatter } from '../../lib/formatting/format';
import { useFormat } from '../../lib/formatting/use-format';
import { timeTicks } from './time-ticks';
import { brokenTimeScale, type BrokenTimeScale, type TimeStretch } from './broken-time-scale';
import styles from './trace-chart.module.css';
import { loadTicks, nearestIndex, tracePath } from './trace-path';
import { useElementWidth } from './use-element-width';

export type Trace = LogReviewDto['traces'][number];

interface TraceChartProps {
  trace: Trace;
  findings: readonly LogFindingDto[];
  zone: string;
  /** Recorded time of the whole log, the same for all its traces. */
  stretches: readonly TimeStretch[];
  /** The moment all traces of the page point at, so that one gust is seen on every channel. */
  cursorMs: number | null;
  onCursor: (atMs: number) => void;
}

const PLOT_HEIGHT = 140;
const MARGIN = { top: 8, right: 8, bottom: 40, left: 52 };
const TICK_WIDTH = 90;

/** Highest and lowest load of one channel over the time of the log, as one band. */
export function TraceChart({ trace, findings, zone, stretches, cursorMs, onCursor }: TraceChartProps) {
  const format = useFormat();
  const titleId = useId();
  const [frameRef, frameWidth] = useElementWidth<HTMLDivElement>(640);
  const width = Math.max(120, frameWidth - MARGIN.left - MARGIN.right);

  const yTicks = useMemo(() => {
    const low = Math.min(0, format.forceFromKn(trace.minKn ?? 0));
    const high = format.forceFromKn(trace.maxKn ?? 0);
    return loadTicks(low, high > low ? high : low + 1);
  }, [trace, format]);
  const step = yTicks.length > 1 ? yTicks[1] - yTicks[0] : 1;
  const tickDecimals = Math.max(0, -Math.floor(Math.log10(step)));
  const lowKn = format.forceToKn(yTicks[0]);
  const highKn = format.forceToKn(yTicks[yTicks.length - 1]);
  const scale = useMemo(() => brokenTimeScale(stretches, width), [stretches, width]);
  const path = useMemo(
    () => tracePath(trace, { xOf: scale.xOf, lowKn, highKn, height: PLOT_HEIGHT }),
    [trace, scale, lowKn, highKn],
  );
  const xLabels = useMemo(() => axisLabels(scale, zone, format), [scale, zone, format]);
  const xOf = scale.xOf;
  const yOf = (value: number): number =>
    PLOT_HEIGHT - ((value - lowKn) / (highKn - lowKn || 1)) * PLOT_HEIGHT;

  const index = cursorMs === null ? -1 : nearestIndex(trace.atMs, cursorMs);
  const readout =
    index < 0
      ? `Highest ${format.force(trace.maxKn)}${trace.maxAt === null ? '' : ` on ${format.instant(trace.maxAt, zone)}`}, lowest ${format.force(trace.minKn)}.`
      : `${format.instant(trace.atMs[index], zone)}: ${format.force(trace.lowKn[index])} to ${format.force(trace.highKn[index])}.`;

  function moveTo(nextIndex: number): void {
    const at = trace.atMs[Math.min(trace.atMs.length - 1, Math.max(0, nextIndex))];
    if (at !== undefined) onCursor(at);
  }
  function onKeyDown(event: KeyboardEvent): void {
    const last = trace.atMs.length - 1;
    const page = Math.max(1, Math.round(last / 20));
    const target: Partial<Record<string, number>> = {
      ArrowRight: index + 1,
      ArrowUp: index + 1,
      ArrowLeft: index - 1,
      ArrowDown: index - 1,
      PageUp: index + page,
      PageDown: index - page,
      Home: 0,
      End: last,
    };
    const next = target[event.key];
    if (next === undefined) return;
    event.preventDefault();
    moveTo(next);
  }
  function onPointer(event: PointerEvent<HTMLDivElement>): void {
    const box = event.currentTarget.getBoundingClientRect();
    moveTo(nearestIndex(trace.atMs, scale.msOf(event.clientX - box.left - MARGIN.left)));
  }

  // Pauses are the breaks of the axis already.
  const marked = findings.filter(
    ({ code, column, fromAt }) =>
      code !== 'gap' && (column === null || column === trace.column) && fromAt !== null,
  );
  return (
    <section className={styles.trace} aria-labelledby={titleId}>
      <div className={styles.heading}>
        <h3 id={titleId}>{trace.positionLabel}</h3>
        <span className="soft">column {trace.column}</span>
      </div>
      <div
        ref={frameRef}
        className={`${styles.plot} ${styles.cursor}`}
        role="slider"
        tabIndex={0}
        aria-label={`Time on the trace of ${trace.positionLabel}`}
        aria-valuemin={0}
        aria-valuemax={Math.max(0, trace.atMs.length - 1)}
        aria-valuenow={Math.max(0, index)}
        aria-valuetext={readout}
        onKeyDown={onKeyDown}
        onPointerMove={onPointer}
        onPointerDown={onPointer}
      >
        <svg
          aria-hidden="true"
          height={PLOT_HEIGHT + MARGIN.top + MARGIN.bottom}
          viewBox={`0 0 ${width + MARGIN.left + MARGIN.right} ${PLOT_HEIGHT + MARGIN.top + MARGIN.bottom}`}
        >
          <g transform={`translate(${MARGIN.left} ${MARGIN.top})`}>
            {yTicks.map((tick) => (
              <g key={tick} transform={`translate(0 ${yOf(format.forceToKn(tick)).toFixed(1)})`}>
                <line className={styles.grid} x2={width} />
                <text className={styles.tick} x={-8} dy="0.32em" textAnchor="end">
                  {format.number(tick, tickDecimals)}
                </text>
              </g>
            ))}
            <path className={styles.band} d={path} />
            {marked.map((finding, position) => {
              const start = xOf(Date.parse(finding.fromAt ?? ''));
              // A finding in many places spans from the first to the last of them; only the first is marked.
              const end = finding.toAt === null || finding.count > 1 ? start : xOf(Date.parse(finding.toAt));
              return (
                <rect
                  key={`${finding.code}-${position}`}
                  className={styles.finding}
                  x={start}
                  y={PLOT_HEIGHT - 5}
                  width={Math.max(3, end - start)}
                  height={10}
                  rx={3}
                />
              );
            })}
            {scale.stretches.map(({ fromX, toX }, position) => (
              <g key={fromX} transform={`translate(0 ${PLOT_HEIGHT})`}>
                <line className={styles.axis} x1={fromX} x2={toX} />
                {position > 0 && <BreakMark x={(scale.stretches[position - 1].toX + fromX) / 2} />}
              </g>
            ))}
            {xLabels.map(({ x, text }) => (
              <g key={x} transform={`translate(${x.toFixed(1)} ${PLOT_HEIGHT})`}>
                <line className={styles.axis} y2={5} />
                <text className={styles.tick} y={18} textAnchor={x > width - 24 ? 'end' : 'middle'}>
                  {text}
                </text>
              </g>
            ))}
            <text className={styles.axisTitle} x={width} y={PLOT_HEIGHT + 36} textAnchor="end">
              Time ({zone})
            </text>
            <text
              className={styles.axisTitle}
              transform={`translate(${-MARGIN.left + 12} ${PLOT_HEIGHT / 2}) rotate(-90)`}
              textAnchor="middle"
            >
              Load ({format.forceUnit})
            </text>
            {index >= 0 && (
              <line
                className={styles.hair}
                x1={xOf(trace.atMs[index])}
                x2={xOf(trace.atMs[index])}
                y2={PLOT_HEIGHT}
              />
            )}
          </g>
        </svg>
      </div>
      <p className={styles.readout}>{readout}</p>
    </section>
  );
}

/** Two slanted strokes where time was cut out. */
function BreakMark({ x }: { x: number }) {
  return <path className={styles.axis} d={`M${x - 4} 5L${x} -5M${x} 5L${x + 4} -5`} />;
}

interface AxisLabel {
  x: number;
  text: string;
}

const LABEL_GAP = 54;

/** The day where each stretch of recording begins, and round clock times or days where there is room between. */
function axisLabels(scale: BrokenTimeScale, zone: string, format: Formatter): AxisLabel[] {
  const isBroken = scale.stretches.length > 1;
  const wanted = scale.stretches.flatMap(({ fromMs, toMs, fromX, toX }) => {
    const ticks = timeTicks(fromMs, toMs, zone, Math.max(1, Math.floor((toX - fromX) / TICK_WIDTH)));
    const inside = ticks.map(({ atMs, isDayStart }) => ({
      x: scale.xOf(atMs),
      text: tickLabel(format.instant(atMs, zone), isDayStart),
    }));
    return isBroken ? [{ x: fromX, text: tickLabel(format.instant(fromMs, zone), true) }, ...inside] : inside;
  });
  const kept: AxisLabel[] = [];
  for (const label of wanted) {
    const last = kept[kept.length - 1];
    if (last === undefined || label.x - last.x >= LABEL_GAP) kept.push(label);
  }
  return kept;
}

/** "14 Mar 2027, 16:05" cut to what a tick has room for: the day where a day begins, else the time. */
function tickLabel(instant: string, isDayStart: boolean): string {
  const [day, time] = instant.split(', ');
  return isDayStart ? day.split('\u00a0').slice(0, 2).join('\u00a0') : time;
}
