import type { PositionDto } from '@stayledger/shared/contracts/rig';
import { useId, useMemo, useState, type KeyboardEvent } from 'react';
import { Link, useNavigate } from 'react-router-dom';
import { paths } from '../../app/paths';
import { DueWord } from '../../components/part-mark/due-word';
import { PartMark } from '../../components/part-mark/part-mark';
import { standingText, standingWord } from '../../components/part-mark/standing-words';
import { useFormat } from '../../lib/formatting/use-format';
import { useIsPhone } from '../../theme/colour-mode';
import type { DrawnRig } from './drawn-rig';
import { elevationDrawing, type DrawnPoint } from './elevation-drawing';
import styles from './rig-elevation.module.css';

interface RigElevationProps {
  name: string;
  rig: DrawnRig;
  todayOn: string;
  zone: string;
}

/** A wide drawing beside the words, a narrow one above them; marks keep their size in both. */
const WIDE = { width: 720, maxHeight: 500, markSize: 24 } as const;
const PHONE = { width: 343, maxHeight: 460, markSize: 18 } as const;
/** A wire this thick is drawn one pixel wide; others in proportion. */
const MM_PER_PX = 6;

/**
 * The vessel's own rig as a line drawing. One stop for the keyboard: arrows go from part to part in rig order, Home and End
 * to its ends, Enter opens the part. The table of the rig is its twin and says the same.
 */
export function RigElevation({ name, rig, todayOn, zone }: RigElevationProps) {
  const id = useId();
  const format = useFormat();
  const navigate = useNavigate();
  const frame = useIsPhone() ? PHONE : WIDE;
  const [chosenId, setChosenId] = useState<string | null>(null);
  const drawing = useMemo(
    () =>
      elevationDrawing(
        rig.geometry,
        rig.drawn.map(({ position, geometry }) => ({ id: position.id, geometry })),
        frame,
      ),
    [rig, frame],
  );
  const positions = rig.drawn.map(({ position }) => position);
  const chosenIndex = positions.findIndex((position) => position.id === chosenId);
  const chosen = positions[chosenIndex];
  if (positions.length === 0) return null;

  const choose = (index: number) => {
    const kept = Math.min(Math.max(index, 0), positions.length - 1);
    setChosenId(positions[kept].id);
  };
  const onKeyDown = (event: KeyboardEvent) => {
    const steps: Record<string, () => void> = {
      ArrowDown: () => choose(chosenIndex + 1),
      ArrowRight: () => choose(chosenIndex + 1),
      ArrowUp: () => choose(chosenIndex < 0 ? positions.length - 1 : chosenIndex - 1),
      ArrowLeft: () => choose(chosenIndex < 0 ? positions.length - 1 : chosenIndex - 1),
      Home: () => choose(0),
      End: () => choose(positions.length - 1),
      Enter: () => {
        if (chosen?.part) void navigate(paths.part.to(chosen.part.id));
      },
    };
    const step = steps[event.key];
    if (!step || event.altKey || event.ctrlKey || event.metaKey) return;
    event.preventDefault();
    step();
  };

  return (
    <section aria-labelledby={`${id}title`} className={styles.elevation}>
      <h2 id={`${id}title`} className="visually-hidden">
        Drawing of the rig
      </h2>
      <div
        role="listbox"
        tabIndex={0}
        aria-label={`Parts of ${name} on the drawing, in rig order`}
        aria-activedescendant={chosen ? `${id}${chosen.id}` : undefined}
        className={styles.drawing}
        onKeyDown={onKeyDown}
        onFocus={() => {
          if (!chosen) choose(0);
        }}
      >
        <svg
          viewBox={`0 0 ${drawing.width} ${drawing.height}`}
          width={drawing.width}
          height={drawing.height}
          role="presentation"
          className={styles.paper}
        >
          <path className={styles.hull} d={`${lineOf(drawing.deck)}Z`} />
          {drawing.bowsprit ? <path className={styles.spar} d={lineOf(drawing.bowsprit)} /> : null}
          {drawing.masts.map((line, index) => (
            <path key={index} className={styles.spar} d={lineOf(line)} />
          ))}
          {drawing.spreaders.map((line, index) => (
            <path key={index} className={styles.spreader} d={lineOf(line)} />
          ))}
          {drawing.stays.map((stay) => (
            <path key={stay.id} className={styles.leader} d={lineOf([stay.path[0], stay.mark])} />
          ))}
          {drawing.stays.map((stay, index) => {
            const position = positions[index];
            const line = lineOf(stay.path);
            return (
              <g
                key={stay.id}
                id={`${id}${stay.id}`}
                role="option"
                aria-selected={stay.id === chosenId}
                aria-label={optionText(position, format)}
                className={styles.stay}
                onClick={() => setChosenId(stay.id)}
                onDoubleClick={() => {
                  if (position.part) void navigate(paths.part.to(position.part.id));
                }}
              >
                <path className={styles.reach} d={line} />
                <path
                  className={position.part ? styles.wire : styles.gap}
                  d={line}
                  strokeWidth={position.part ? Math.max(1, position.part.diameterMm / MM_PER_PX) : 1}
                />
                <circle
                  className={styles.ground}
                  cx={stay.mark.x}
                  cy={stay.mark.y}
                  r={frame.markSize * 0.5}
                />
                {position.part ? (
                  <g
                    aria-hidden="true"
                    transform={`translate(${stay.mark.x - frame.markSize * 0.45} ${stay.mark.y - frame.markSize * 0.55})`}
                  >
                    <PartMark
                      standing={position.part.standing}
                      kindOfWire={position.part.kindOfWire}
                      size={frame.markSize}
                    />
                  </g>
                ) : (
                  <circle
                    className={styles.noPart}
                    cx={stay.mark.x}
                    cy={stay.mark.y}
                    r={frame.markSize * 0.2}
                  />
                )}
              </g>
            );
          })}
        </svg>
      </div>
      <div className={styles.side}>
        {chosen ? (
          <Chosen position={chosen} todayOn={todayOn} zone={zone} />
        ) : (
          <p className="soft">Pick a part on the drawing, or go through them with the arrow keys.</p>
        )}
        <p className={styles.note}>
          {rig.suggested
            ? 'Nobody has measured this rig yet: drawn with the proportions usual for its type. '
            : 'Drawn from the geometry entered for this vessel. '}
          Seen from starboard, bow to the left.
          {rig.notDrawn.length > 0
            ? ` Not drawn: ${rig.notDrawn.map(({ label }) => label.toLowerCase()).join(', ')}.`
            : ''}
        </p>
      </div>
    </section>
  );
}

/** What was picked, in the words of the table. */
function Chosen({ position, todayOn, zone }: { position: PositionDto; todayOn: string; zone: string }) {
  const format = useFormat();
  const { part } = position;
  return (
    <div className={styles.chosen}>
      {part ? <PartMark standing={part.standing} kindOfWire={part.kindOfWire} size={48} /> : null}
      <div>
        <p className={styles.label}>
          {position.label}
          {position.alias ? <span className="soft"> {position.alias}</span> : null}
        </p>
        {part ? (
          <>
            <p className="soft">
              {part.constructionName}, {format.diameter(part.diameterMm)}
            </p>
            <p>
              <DueWord due={part.standing.due}>{standingWord(part.standing)}</DueWord>
              {part.standing.replaceByOn
                ? `, replace by ${format.dueDay(part.standing.replaceByOn, todayOn, zone)}`
                : ''}
            </p>
            <p>
              <Link to={paths.part.to(part.id)}>Open the part</Link>
            </p>
          </>
        ) : (
          <p className="soft">No part fitted.</p>
        )}
      </div>
    </div>
  );
}

function optionText({ label, part }: PositionDto, format: ReturnType<typeof useFormat>): string {
  return part ? `${label}: ${standingText(part.standing, {}, format)}` : `${label}: no part fitted`;
}

function lineOf(points: readonly DrawnPoint[]): string {
  return points.map(({ x, y }, index) => `${index === 0 ? 'M' : 'L'}${x} ${y}`).join('');
}
