import { useId } from 'react';
import { useFormat } from '../../lib/formatting/use-format';
import { eighthsUsed, partMarkGeometry, type MarkRim, type WireKind } from './part-mark-geometry';
import styles from './part-mark.module.css';
import { standingText, type MarkedStanding, type PartCondition } from './standing-words';

interface PartMarkProps extends PartCondition {
  standing: MarkedStanding;
  kindOfWire: WireKind;
  /** 18 in tables, 24 in lists, 48 on cards, 160 on the part page. */
  size?: 18 | 24 | 48 | 160;
  /** Replaces the text alternative, where the page says the same in other words (owners read no percentages). */
  alternative?: string;
}

/** The part mark: a section that fills with ink from the bottom as the allowance is used. */
export function PartMark({ standing, kindOfWire, size = 18, alternative, ...condition }: PartMarkProps) {
  const clip = useId();
  const format = useFormat();
  const { failed, suspended, provisional } = condition;
  const calendarOnly = standing.assessment === 'calendar-only';
  const assessed = standing.assessment === 'assessed' && standing.allowanceUsed !== null && !suspended;
  const eighths = assessed && standing.allowanceUsed !== null ? eighthsUsed(standing.allowanceUsed) : null;
  const mark = partMarkGeometry(kindOfWire, size, eighths);
  const due = !suspended && (standing.due === 'due' || standing.due === 'overdue');
  const empty = !assessed && !calendarOnly && !suspended && !failed;
  const rim: MarkRim = provisional ? 'dotted' : empty ? 'dashed' : 'solid';
  const { x, y } = mark.centre;
  const hand = mark.radius;
  const inner = size <= 24 ? 1.5 : size < 100 ? 2 : 4;

  return (
    <svg
      className={styles.mark}
      data-due={due}
      role="img"
      aria-label={alternative ?? standingText(standing, condition, format)}
      width={size}
      height={size}
      viewBox={`0 0 ${size} ${size}`}
    >
      <defs>
        <clipPath id={`${clip}rim`}>
          <path d={mark.rimPath} />
        </clipPath>
        {mark.levelY === null ? null : (
          <>
            <clipPath id={`${clip}above`}>
              <rect x={0} y={0} width={size} height={mark.levelY} />
            </clipPath>
            <clipPath id={`${clip}below`}>
              <rect x={0} y={mark.levelY} width={size} height={size - mark.levelY} />
            </clipPath>
          </>
        )}
      </defs>
      <path className={styles.section} d={mark.rimPath} />
      {mark.levelY === null ? null : (
        <rect
          className={styles.ink}
          x={0}
          y={mark.levelY}
          width={size}
          height={size - mark.levelY}
          clipPath={`url(#${clip}rim)`}
        />
      )}
      {mark.wires.length > 0 && !empty && !calendarOnly && !suspended ? (
        <>
          <g className={styles.wireAbove} clipPath={mark.levelY === null ? undefined : `url(#${clip}above)`}>
            {mark.wires.map((wire, index) => (
              <circle key={index} cx={wire.x} cy={wire.y} r={wire.radius} />
            ))}
          </g>
          {mark.levelY === null ? null : (
            <g className={styles.wireBelow} clipPath={`url(#${clip}below)`}>
              {mark.wires.map((wire, index) => (
                <circle key={index} cx={wire.x} cy={wire.y} r={wire.radius} />
              ))}
            </g>
          )}
        </>
      ) : null}
      <g className={styles.hatch}>
        {mark.hatches.map((line, index) => (
          <line key={index} {...line} />
        ))}
      </g>
      <path
        className={styles.rim}
        d={mark.rimPath}
        strokeWidth={rimWidth(rim, size, due ? Math.max(2, mark.strokeWidth) : mark.strokeWidth)}
        strokeDasharray={dashes(rim, size)}
        strokeLinecap={rim === 'dotted' ? 'round' : 'butt'}
      />
      {calendarOnly && !suspended ? (
        <path
          className={styles.sign}
          strokeWidth={inner}
          d={`M${x} ${y - hand * 0.6}V${y}L${x + hand * 0.42} ${y + hand * 0.24}`}
        />
      ) : null}
      {empty ? (
        <path className={styles.sign} strokeWidth={inner} d={`M${x - hand * 0.35} ${y}H${x + hand * 0.35}`} />
      ) : null}
      {suspended ? (
        <path
          className={styles.sign}
          strokeWidth={inner * 1.2}
          d={`M${x - hand * 0.25} ${y - hand * 0.42}V${y + hand * 0.42}M${x + hand * 0.25} ${y - hand * 0.42}V${y + hand * 0.42}`}
        />
      ) : null}
      {failed ? (
        <>
          <path
            className={styles.barGround}
            strokeWidth={inner * 3}
            d={`M${x - hand * 1.1} ${y + hand * 0.55}L${x + hand * 1.1} ${y - hand * 0.55}`}
          />
          <path
            className={styles.sign}
            strokeWidth={inner * 1.4}
            d={`M${x - hand * 1.1} ${y + hand * 0.55}L${x + hand * 1.1} ${y - hand * 0.55}`}
          />
        </>
      ) : null}
      {due ? (
        <g className={styles.flag}>
          <line {...mark.flag.pole} strokeWidth={size <= 24 ? 1.5 : mark.strokeWidth} />
          <path d={mark.flag.cloth} />
        </g>
      ) : null}
    </svg>
  );
}

/** Dashes and dots grow with the mark, up to a size at which more would leave the rim open. */
function rimUnit(size: number): number {
  return Math.min(Math.max(size / 24, 1), 3);
}

/** Dots are as broad as they are long: on a large mark a hairline of dots would not be seen. */
function rimWidth(rim: MarkRim, size: number, width: number): number {
  return rim === 'dotted' ? Math.max(width, 1.5 * rimUnit(size)) : width;
}

function dashes(rim: MarkRim, size: number): string | undefined {
  const unit = rimUnit(size);
  if (rim === 'dashed') return `${3 * unit} ${2 * unit}`;
  if (rim === 'dotted') return `0.1 ${2.6 * unit}`;
  return undefined;
}
