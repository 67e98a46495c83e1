import type { LoadLogDto } from '@stayledger/shared/contracts/load-logs';
import { useId, useRef, useState, type FormEvent } from 'react';
import { Attention } from '../../components/feedback/attention';
import { PlainButton } from '../../components/plain-button/plain-button';
import { newIdempotencyKey } from '../../lib/api-client';
import styles from './decision-foot.module.css';
import { usePostLoadLog, useSetAsideLoadLog } from './load-logs.mutations';

interface DecisionFootProps {
  log: LoadLogDto;
  /** Why posting is not possible; null when it is. */
  postDisabledReason: string | null;
  mayDecide: boolean;
}

/** The two ways a counted log can go. Posting takes a person's click and nothing else. */
export function DecisionFoot({ log, postDisabledReason, mayDecide }: DecisionFootProps) {
  const reasonId = useId();
  const whyId = useId();
  const [isSettingAside, setIsSettingAside] = useState(false);
  const [reason, setReason] = useState('');
  const [complaint, setComplaint] = useState<string | null>(null);
  const reasonField = useRef<HTMLTextAreaElement>(null);
  // One wish, one key: a click that is repeated because the reply got lost posts once.
  const [keys] = useState(() => ({ post: newIdempotencyKey(), setAside: newIdempotencyKey() }));
  const post = usePostLoadLog(log.id);
  const setAside = useSetAsideLoadLog(log.id);
  const isBusy = post.isPending || setAside.isPending;
  const error = post.error ?? setAside.error;

  function onSetAside(event: FormEvent): void {
    event.preventDefault();
    if (reason.trim() === '') {
      setComplaint('Say why it is set aside. Whoever looks for its hours later will want to know.');
      reasonField.current?.focus();
      return;
    }
    setComplaint(null);
    setAside.mutate({ version: log.version, reason: reason.trim(), idempotencyKey: keys.setAside });
  }

  if (!mayDecide) {
    return (
      <div className={styles.foot}>
        <p className={styles.reason}>
          A surveyor or rigger who looks after this vessel reads the findings and posts the log to the ledger.
        </p>
      </div>
    );
  }
  return (
    <div className={styles.foot} role="region" aria-label="Decide about this log">
      {error !== null && <Attention role="alert">{error.message}</Attention>}
      {isSettingAside ? (
        <form className={styles.form} onSubmit={onSetAside} noValidate>
          <label htmlFor={reasonId}>Why is this log set aside?</label>
          <textarea
            ref={reasonField}
            id={reasonId}
            value={reason}
            maxLength={1000}
            aria-invalid={complaint !== null}
            onChange={(event) => setReason(event.target.value)}
          />
          {complaint !== null && <Attention role="alert">{complaint}</Attention>}
          <div className={styles.row}>
            <PlainButton type="submit" disabled={isBusy}>
              {setAside.isPending ? 'Setting aside…' : 'Set aside'}
            </PlainButton>
            <PlainButton onClick={() => setIsSettingAside(false)} disabled={isBusy}>
              Back
            </PlainButton>
          </div>
        </form>
      ) : (
        <div className={styles.row}>
          <PlainButton
            weight="primary"
            disabled={postDisabledReason !== null || isBusy}
            aria-describedby={whyId}
            onClick={() => post.mutate({ version: log.version, idempotencyKey: keys.post })}
          >
            {post.isPending ? 'Posting…' : 'Post to ledger'}
          </PlainButton>
          <PlainButton disabled={isBusy} onClick={() => setIsSettingAside(true)}>
            Set aside…
          </PlainButton>
          <p id={whyId} className={styles.reason}>
            {postDisabledReason ??
              'Posting adds entries to the accounts above. Entries are never edited or deleted.'}
          </p>
        </div>
      )}
    </div>
  );
}
