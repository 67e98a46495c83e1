import type { ReactNode } from 'react';
import styles from './page-heading.module.css';

interface PageHeadingProps {
  title: string;
  /** Stands above the title: the way up. */
  above?: ReactNode;
  /** One line under the title. */
  below?: ReactNode;
  actions?: ReactNode;
  /** Left of the title, such as a part mark. */
  mark?: ReactNode;
}

/** The page's one h1, the document's title, and the page's actions. */
export function PageHeading({ title, above, below, actions, mark }: PageHeadingProps) {
  return (
    <div className={styles.heading}>
      <title>{`${title} · Stayledger`}</title>
      {above ? <div className={styles.above}>{above}</div> : null}
      <div className={styles.row}>
        {mark}
        <div className={styles.words}>
          <h1>{title}</h1>
          {below ? <div className={styles.below}>{below}</div> : null}
        </div>
        {actions ? <div className={styles.actions}>{actions}</div> : null}
      </div>
    </div>
  );
}
