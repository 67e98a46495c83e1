import styles from './feedback.module.css';

/** Ruled lines waiting to be written on; the words are read out. */
export function LoadingState({ label = 'Loading' }: { label?: string }) {
  return (
    <div role="status" className={styles.loading}>
      {label}…
      <div className={styles.lines} aria-hidden="true">
        <div className={styles.line} />
        <div className={styles.line} />
        <div className={styles.line} />
      </div>
    </div>
  );
}
