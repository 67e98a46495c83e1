import type { VesselDto } from '@stayledger/shared/contracts/vessels';
import { useMutation } from '@tanstack/react-query';
import { useState, type FormEvent } from 'react';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { Attention } from '../../components/feedback/attention';
import { PlainInput } from '../../components/forms/plain-fields';
import { useIdempotencyKey } from '../../components/forms/use-idempotency-key';
import { PlainButton } from '../../components/plain-button/plain-button';
import { createSister } from './rig-start.mutations';
import styles from './rig-start.module.css';

interface SisterStartProps {
  vessel: Pick<VesselDto, 'id' | 'name'>;
  onDone: (sister: VesselDto) => void | Promise<void>;
}

/** A sister vessel: the rig of this one under another name. */
export function SisterStart({ vessel, onDone }: SisterStartProps) {
  const [name, setName] = useState('');
  const [withParts, setWithParts] = useState(true);
  const [missing, setMissing] = useState(false);
  const keyFor = useIdempotencyKey();
  const input = { name: name.trim(), withParts };
  const creating = useMutation({
    mutationFn: () => createSister(vessel.id, input, keyFor(input)),
    onSuccess: onDone,
  });
  const submit = (event: FormEvent) => {
    event.preventDefault();
    setMissing(input.name === '');
    if (input.name !== '') creating.mutate();
  };
  return (
    <form className={styles.start} onSubmit={submit} noValidate>
      <PlainInput
        label="Name of the sister vessel"
        value={name}
        maxLength={120}
        autoComplete="off"
        error={missing ? 'Give the vessel a name.' : undefined}
        onChange={(event) => setName(event.target.value)}
      />
      <label className={styles.check}>
        <input type="checkbox" checked={withParts} onChange={(event) => setWithParts(event.target.checked)} />
        <span>Also what is fitted: construction, diameter, terminals and hardware</span>
      </label>
      <p>
        Days, batches, papers and accounts stay with {vessel.name}: every copied part is of unknown age until
        you enter its day.
      </p>
      {creating.error ? <Attention role="alert">{creating.error.message}</Attention> : null}
      <div className={styles.actions}>
        <PlainButton type="submit" weight="primary" disabled={creating.isPending}>
          {creating.isPending ? 'Registering…' : 'Register the sister vessel'}
        </PlainButton>
        <Link to={paths.vessel.to(vessel.id)} className={styles.check}>
          Cancel
        </Link>
      </div>
    </form>
  );
}
