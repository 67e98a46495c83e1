import { useEffect, useId, useRef, useState, type ReactNode } from 'react';
import { GLOSSARY, type GlossaryWord } from './glossary';
import styles from './term.module.css';

/** A word with its explanation behind it, opened by pointer or keyboard and closed by Escape or by going on. */
export function Term({ word, children }: { word: GlossaryWord; children?: ReactNode }) {
  const id = useId();
  // Where the note stands, in the window: a scrolling table would cut off one that is placed inside it.
  const [at, setAt] = useState<{ left: number; top: number } | null>(null);
  const open = at !== null;
  const place = useRef<HTMLSpanElement>(null);

  useEffect(() => {
    if (!open) return;
    const leave = (event: Event) => {
      if (
        event instanceof KeyboardEvent
          ? event.key === 'Escape'
          : !place.current?.contains(event.target as Node)
      ) {
        setAt(null);
      }
    };
    document.addEventListener('keydown', leave);
    document.addEventListener('pointerdown', leave);
    const goOn = () => setAt(null);
    window.addEventListener('scroll', goOn, { capture: true, passive: true });
    return () => {
      window.removeEventListener('scroll', goOn, { capture: true });
      document.removeEventListener('keydown', leave);
      document.removeEventListener('pointerdown', leave);
    };
  }, [open]);

  return (
    <span className={styles.place} ref={place}>
      <button
        type="button"
        className={styles.term}
        aria-expanded={open}
        aria-controls={id}
        onClick={(event) => setAt(open ? null : below(event.currentTarget))}
      >
        {children ?? word}
      </button>
      <span id={id} role="note" className={styles.note} hidden={!open} style={at ?? undefined}>
        {GLOSSARY[word]}
      </span>
    </span>
  );
}

const NOTE_WIDTH_PX = 320;
const EDGE_PX = 16;

function below(button: HTMLElement): { left: number; top: number } {
  const { left, bottom } = button.getBoundingClientRect();
  return {
    left: Math.max(EDGE_PX, Math.min(left, window.innerWidth - NOTE_WIDTH_PX - EDGE_PX)),
    top: bottom + 4,
  };
}
