import { useId, type InputHTMLAttributes, type ReactNode, type SelectHTMLAttributes } from 'react';
import styles from './plain-fields.module.css';

interface Labelled {
  label: string;
  error?: string;
}

/** A labelled input for the pages that do not load antd. */
export function PlainInput({ label, error, ...rest }: InputHTMLAttributes<HTMLInputElement> & Labelled) {
  const id = useId();
  return (
    <div className={styles.field}>
      <label className={styles.label} htmlFor={id}>
        {label}
      </label>
      <input
        {...rest}
        id={id}
        className={styles.input}
        aria-invalid={error ? true : undefined}
        aria-describedby={error ? `${id}error` : undefined}
      />
      {error ? (
        <p id={`${id}error`} className={styles.error}>
          {error}
        </p>
      ) : null}
    </div>
  );
}

export function PlainSelect({
  label,
  children,
  ...rest
}: SelectHTMLAttributes<HTMLSelectElement> & { label: string; children: ReactNode }) {
  const id = useId();
  return (
    <div className={styles.field}>
      <label className={styles.label} htmlFor={id}>
        {label}
      </label>
      <select {...rest} id={id} className={styles.input}>
        {children}
      </select>
    </div>
  );
}
