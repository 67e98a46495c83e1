import type { ReactNode } from 'react';
import styles from './feedback.module.css';

/** A line that needs attention: brass ring and words. Rust is kept for what is due. */
export function Attention({ children, role }: { children: ReactNode; role?: 'alert' | 'status' }) {
  return (
    <div role={role} className={styles.attention}>
      <span className={styles.ring} aria-hidden="true" />
      <div>{children}</div>
    </div>
  );
}
