import type { LoadLogDto } from '@stayledger/shared/contracts/load-logs';
import { useId, useRef, useState, type FormEvent } from 'react';
import { Attention } from '../../components/feedback/attention';
import { PlainButton } from '../../components/plain-button/plain-button';
import { newIdempotencyKey } from '../../lib/api-client';
import styles from './decision-foot.module.css';
import { useReverseLoadLog } from './load-logs.mutations';

/** The way back for a log that was posted by mistake: says first what it does, then wants a reason. */
export function ReverseLog({ log }: { log: LoadLogDto }) {
  const reasonId = useId();
  const [isOpen, setIsOpen] = useState(false);
  const [reason, setReason] = useState('');
  const [complaint, setComplaint] = useState<string | null>(null);
  const field = useRef<HTMLTextAreaElement>(null);
  const [key] = useState(newIdempotencyKey);
  const reverse = useReverseLoadLog(log.id);

  function onReverse(event: FormEvent): void {
    event.preventDefault();
    if (reason.trim() === '') {
      setComplaint('Say why it is taken back. The reason stands beside every entry it reverses.');
      field.current?.focus();
      return;
    }
    setComplaint(null);
    reverse.mutate({ version: log.version, reason: reason.trim(), idempotencyKey: key });
  }

  if (!isOpen) {
    return (
      <p>
        <PlainButton onClick={() => setIsOpen(true)}>Take back from the ledger…</PlainButton>
      </p>
    );
  }
  return (
    <form className={styles.form} onSubmit={onReverse} noValidate aria-label="Take this log back">
      <p>
        Every entry this log made is reversed by a further entry; none is deleted. The allowance used and the
        dates of the parts above fall back to what the other logs say, which may be less than they have
        carried. The log then waits for review again: post it anew, read it with another mapping, or set it
        aside.
      </p>
      <label htmlFor={reasonId}>Why is this log taken back?</label>
      <textarea
        ref={field}
        id={reasonId}
        value={reason}
        maxLength={1000}
        aria-invalid={complaint !== null}
        onChange={(event) => setReason(event.target.value)}
      />
      {complaint !== null && <Attention role="alert">{complaint}</Attention>}
      {reverse.error !== null && <Attention role="alert">{reverse.error.message}</Attention>}
      <div className={styles.row}>
        <PlainButton type="submit" disabled={reverse.isPending}>
          {reverse.isPending ? 'Taking back…' : 'Take it back'}
        </PlainButton>
        <PlainButton onClick={() => setIsOpen(false)} disabled={reverse.isPending}>
          Leave it posted
        </PlainButton>
      </div>
    </form>
  );
}
