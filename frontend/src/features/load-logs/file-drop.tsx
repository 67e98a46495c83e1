import { useId, useState, type DragEvent } from 'react';
import styles from './file-drop.module.css';

interface FileDropProps {
  label: string;
  hint: string;
  disabled?: boolean;
  onFile: (file: File) => void;
}

/** Takes one file, dropped or chosen. The native control stays visible: it is the one every keyboard knows. */
export function FileDrop({ label, hint, disabled = false, onFile }: FileDropProps) {
  const inputId = useId();
  const hintId = useId();
  const [isOver, setIsOver] = useState(false);
  const [tooMany, setTooMany] = useState(false);

  function take(files: FileList | null): void {
    const file = files?.[0];
    setTooMany((files?.length ?? 0) > 1);
    if (file && !disabled) onFile(file);
  }
  function onDrop(event: DragEvent): void {
    event.preventDefault();
    setIsOver(false);
    take(event.dataTransfer.files);
  }
  return (
    <div
      className={`${styles.drop} ${isOver ? styles.over : ''}`}
      onDragOver={(event) => {
        event.preventDefault();
        setIsOver(true);
      }}
      onDragLeave={() => setIsOver(false)}
      onDrop={onDrop}
    >
      <label className={styles.label} htmlFor={inputId}>
        {label}
      </label>
      <input
        id={inputId}
        className={styles.input}
        type="file"
        accept=".csv,.gz,.txt,text/csv,application/gzip"
        aria-describedby={hintId}
        disabled={disabled}
        onChange={(event) => {
          take(event.target.files);
          // Cleared, so that choosing the same file again after a correction is noticed.
          event.target.value = '';
        }}
      />
      <p id={hintId} className={styles.hint}>
        {hint}
      </p>
      {tooMany && (
        <p role="status">Several files were dropped. The first was taken; add the others one by one.</p>
      )}
    </div>
  );
}
