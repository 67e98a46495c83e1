import type { ReactNode } from 'react';
import styles from './forms.module.css';

/** Two short fields beside each other where there is room. */
export function FieldPair({ children }: { children: ReactNode }) {
  return <div className={styles.pair}>{children}</div>;
}
