import {
  DESIGN_FATIGUE_FACTORS,
  type DetailChoiceEffectDto,
  type DetailWithChoiceDto,
  type PreviewDetailChoiceInput,
} from '@stayledger/shared/contracts/detail-choices';
import { ARTICULATIONS } from '@stayledger/shared/contracts/parts';
import { useId, useRef, useState, type FormEvent } from 'react';
import { Link } from 'react-router-dom';
import { Attention } from '../../components/feedback/attention';
import { PlainSelect } from '../../components/forms/plain-fields';
import { PlainButton } from '../../components/plain-button/plain-button';
import { isApiError } from '../../lib/api-error';
import { useFormat } from '../../lib/formatting/use-format';
import { ARTICULATION_CHOICE_WORDS } from './articulation-words';
import { useChooseDetail, usePreviewDetailChoice } from './detail-choices.mutations';
import styles from './detail-choices.module.css';

interface DetailChoiceFormProps {
  partId: string;
  item: DetailWithChoiceDto;
  cancelTo: string;
  onDone: () => void | Promise<void>;
}

const DEFAULT = '';

/** Two steps: see what the choice would do, then keep it with its evidence. Nothing is kept unseen. */
export function DetailChoiceForm({ partId, item, cancelTo, onDone }: DetailChoiceFormProps) {
  const evidenceId = useId();
  // As it was when the form was opened: what somebody else stores meanwhile is a conflict, not a silent loss.
  const [stored] = useState(item.choice);
  const [curve, setCurve] = useState(stored?.curve ? `${stored.curve.id}@${stored.curve.version}` : DEFAULT);
  const [articulation, setArticulation] = useState<string>(stored?.articulation ?? DEFAULT);
  const [factor, setFactor] = useState(
    stored?.designFatigueFactor === null || stored === null ? DEFAULT : `${stored.designFatigueFactor}`,
  );
  const [evidence, setEvidence] = useState(stored?.evidence ?? '');
  const [complaint, setComplaint] = useState<string | null>(null);
  const evidenceField = useRef<HTMLTextAreaElement>(null);
  const preview = usePreviewDetailChoice(partId, item.key);
  const choose = useChooseDetail(partId, item.key, onDone);

  /** What was seen holds for what was chosen then; another choice has to be looked at again. */
  const changed = (set: (value: string) => void) => (event: { target: { value: string } }) => {
    set(event.target.value);
    preview.reset();
  };

  function input(): PreviewDetailChoiceInput {
    const listed = item.curves.find(({ id, version }) => `${id}@${version}` === curve);
    return {
      curve:
        curve === DEFAULT
          ? null
          : listed
            ? { id: listed.id, version: listed.version }
            : (stored?.curve ?? null),
      articulation: ARTICULATIONS.find((value) => value === articulation) ?? null,
      designFatigueFactor: factor === DEFAULT ? null : Number(factor),
    };
  }

  function onSubmit(event: FormEvent): void {
    event.preventDefault();
    if (evidence.trim() === '') {
      setComplaint('Say what this rests on: a certificate, a measurement, a photograph, a test.');
      evidenceField.current?.focus();
      return;
    }
    setComplaint(null);
    if (preview.data === undefined) {
      preview.mutate(input());
      return;
    }
    choose.mutate({ ...input(), version: stored?.version, evidence: evidence.trim() });
  }

  const problem = preview.error ?? choose.error;
  const isOldCurve =
    stored?.curve != null &&
    !item.curves.some(({ id, version }) => id === stored.curve?.id && version === stored.curve.version);
  return (
    <form className={styles.form} onSubmit={onSubmit} noValidate aria-label={`Change the ${item.name}`}>
      <PlainSelect label="Curve" value={curve} onChange={changed(setCurve)}>
        <option value={DEFAULT}>By default</option>
        {isOldCurve && stored.curve && (
          <option value={`${stored.curve.id}@${stored.curve.version}`}>
            As chosen before: {stored.curve.id}, version {stored.curve.version}
          </option>
        )}
        {item.curves.map(({ id, version, name, appliesTo }) => (
          <option key={id} value={`${id}@${version}`}>
            {name} ({appliesTo})
          </option>
        ))}
      </PlainSelect>
      {item.hasArticulation && (
        <PlainSelect label="How the end turns" value={articulation} onChange={changed(setArticulation)}>
          <option value={DEFAULT}>As the part is described</option>
          {ARTICULATIONS.map((value) => (
            <option key={value} value={value}>
              {ARTICULATION_CHOICE_WORDS[value]}
            </option>
          ))}
        </PlainSelect>
      )}
      <PlainSelect label="Design fatigue factor" value={factor} onChange={changed(setFactor)}>
        <option value={DEFAULT}>By default</option>
        {DESIGN_FATIGUE_FACTORS.map((value) => (
          <option key={value} value={`${value}`}>
            {value}: {FACTOR_WORDS[value]}
          </option>
        ))}
      </PlainSelect>
      <div className={styles.evidence}>
        <label htmlFor={evidenceId}>Evidence</label>
        <textarea
          ref={evidenceField}
          id={evidenceId}
          value={evidence}
          maxLength={2000}
          aria-invalid={complaint !== null}
          onChange={(event) => setEvidence(event.target.value)}
        />
        <p className={styles.hint}>
          Your name, the time and these words stand beside the detail. What you leave by default stays an
          estimate.
        </p>
        {complaint !== null && <Attention role="alert">{complaint}</Attention>}
      </div>
      {preview.data !== undefined && <Effect effect={preview.data} name={item.name} />}
      {problem !== null && <Attention role="alert">{problemWords(problem)}</Attention>}
      <div className={styles.row}>
        <PlainButton type="submit" weight="primary" disabled={preview.isPending || choose.isPending}>
          {preview.data === undefined ? 'Show what it changes' : 'Confirm with this evidence'}
        </PlainButton>
        <Link to={cancelTo}>Cancel</Link>
      </div>
    </form>
  );
}

const FACTOR_WORDS: Record<(typeof DESIGN_FATIGUE_FACTORS)[number], string> = {
  3: 'an inspection able to see it is in date',
  5: 'the inspection lapsed, or it is hidden',
  10: 'hidden, never opened, its loss drops the mast',
};

function Effect({ effect, name }: { effect: DetailChoiceEffectDto; name: string }) {
  const format = useFormat();
  const { before, after, entriesReversed } = effect;
  return (
    <div className={styles.effect} role="status">
      <p>
        {before === null && after === null
          ? `Nothing was logged for the ${name}, so no allowance changes yet.`
          : `Allowance used of the ${name}: ${format.allowance(before)} now, ${format.allowance(after)} with this choice.`}
      </p>
      <p>
        {entriesReversed === 0
          ? 'No entry of the ledger changes.'
          : `${format.number(entriesReversed)} ${entriesReversed === 1 ? 'entry is' : 'entries are'} reversed by further entries and written anew; none is deleted.`}
      </p>
      <p>{effect.explanation}</p>
      {effect.estimates.map((estimate) => (
        <p key={estimate} className={styles.hint}>
          Still an estimate: {estimate}
        </p>
      ))}
    </div>
  );
}

function problemWords(problem: Error): string {
  const fields = isApiError(problem) ? Object.values(problem.fieldErrors).flat() : [];
  return fields.length > 0 ? fields.join(' ') : problem.message;
}
