import { useEffect, useId, useRef, useState, type ReactNode } from 'react';
import { GLOSSARY, type GlossaryWord } from './glossary';
import styles from './term.module.css';

/** A word with its explanation behind it, opened by pointer or keyboard and closed by Escape or by going on. */
export function Term({ word, children }: { word: GlossaryWord; children?: ReactNode }) {
  const id = useId();
  const [open, setOpen] = useState(false);
  const place = useRef<HTMLSpanElement>(null);

  useEffect(() => {
    if (!open) return;
    const leave = (event: Event) => {
      if (
        event instanceof KeyboardEvent
          ? event.key === 'Escape'
          : !place.current?.contains(event.target as Node)
      ) {
        setOpen(false);
      }
    };
    document.addEventListener('keydown', leave);
    document.addEventListener('pointerdown', leave);
    return () => {
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
        onClick={() => setOpen((before) => !before)}
      >
        {children ?? word}
      </button>
      <span id={id} role="note" className={styles.note} hidden={!open}>
        {GLOSSARY[word]}
      </span>
    </span>
  );
}
