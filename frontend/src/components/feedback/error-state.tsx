import { ApiError } from '../../lib/api-error';
import { PlainButton } from '../plain-button/plain-button';
import styles from './feedback.module.css';

interface ErrorStateProps {
  error: unknown;
  title?: string;
  onRetry?: () => void;
  retryLabel?: string;
}

/** Says what is wrong and what mends it; the request id leads whoever reads the log to the place. */
export function ErrorState({ error, title, onRetry, retryLabel = 'Try again' }: ErrorStateProps) {
  const notFound = error instanceof ApiError && error.status === 404;
  const forbidden = error instanceof ApiError && error.status === 403;
  const heading =
    title ?? (notFound ? 'Not found' : forbidden ? 'Not open to you' : 'This could not be shown');
  const message = notFound
    ? 'It does not exist, or it is not shared with you. Check the address, or ask who sent you the link.'
    : error instanceof Error
      ? error.message
      : 'The page met a fault of ours. Load it again; if it stays, report it.';
  return (
    <div role="alert" className={styles.block}>
      <h2 className={styles.attention}>
        <span className={styles.ring} aria-hidden="true" />
        {heading}
      </h2>
      <p>{message}</p>
      {error instanceof ApiError && !notFound ? (
        <p className={styles.reference}>Request {error.requestId}</p>
      ) : null}
      {onRetry && !notFound && !forbidden ? (
        <div className={styles.actions}>
          <PlainButton onClick={onRetry}>{retryLabel}</PlainButton>
        </div>
      ) : null}
    </div>
  );
}
