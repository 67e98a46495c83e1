import type { ReactNode } from 'react';
import styles from './feedback.module.css';

/** Says what will stand here, and offers the first step. */
export function EmptyState({
  title,
  children,
  actions,
}: {
  title: string;
  children?: ReactNode;
  actions?: ReactNode;
}) {
  return (
    <div className={styles.block}>
      <h2>{title}</h2>
      {children}
      {actions ? <div className={styles.actions}>{actions}</div> : null}
    </div>
  );
}
