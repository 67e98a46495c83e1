import { stateYardTermsSchema, type YardTermsDto } from '@stayledger/shared/contracts/yard-terms';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState, type FormEvent } from 'react';
import { Attention } from '../../components/feedback/attention';
import { PlainInput } from '../../components/forms/plain-fields';
import { PlainButton } from '../../components/plain-button/plain-button';
import { check } from '../../lib/contract';
import { usePreferences } from '../../lib/session';
import { stateYardTerms } from './rerig-schedules.mutations';
import { rerigQueries } from './rerig-schedules.queries';
import styles from './rerig-schedule.module.css';
import { figureAt, termsGroups, withFigures } from './yard-terms-draft';

/** Prices, hours, lead times, seasons and closures of a firm. What is saved holds for the next plan. */
export function YardTermsForm({ stored }: { stored: YardTermsDto }) {
  const { decimalComma } = usePreferences();
  const queryClient = useQueryClient();
  const groups = termsGroups(stored.currency);
  const fields = groups.flatMap((group) => group.fields);
  const [texts, setTexts] = useState<Record<string, string>>(() =>
    Object.fromEntries(
      fields.map(({ path, scale }) => {
        const text = String(Number((figureAt(stored.terms, path) / scale).toFixed(4)));
        return [path, decimalComma ? text.replace('.', ',') : text];
      }),
    ),
  );
  const [seasons, setSeasons] = useState(stored.terms.seasons);
  const [closures, setClosures] = useState(stored.terms.closures);
  const [problem, setProblem] = useState<{ path: string; message: string } | null>(null);
  const save = useMutation({
    mutationFn: stateYardTerms,
    onSuccess: (terms) => queryClient.setQueryData(rerigQueries.yardTerms().queryKey, terms),
  });

  function onSubmit(event: FormEvent): void {
    event.preventDefault();
    const checked = check(stateYardTermsSchema, {
      version: stored.version ?? undefined,
      terms: withFigures({ ...stored.terms, seasons, closures }, fields, texts),
    });
    if (!checked.ok) {
      const [issue] = checked.issues;
      setProblem({ path: issue.path.slice(1).map(String).join('.'), message: issue.message });
      return;
    }
    setProblem(null);
    save.mutate(checked.value);
  }

  const errorAt = (path: string) => (problem?.path === path ? problem.message : undefined);
  const isShown = problem !== null && [...fields.map(({ path }) => path)].includes(problem.path);
  const changeSeason = (at: number, part: Partial<(typeof seasons)[number]>) =>
    setSeasons(seasons.map((season, index) => (index === at ? { ...season, ...part } : season)));
  const changeClosure = (at: number, part: Partial<(typeof closures)[number]>) =>
    setClosures(closures.map((closure, index) => (index === at ? { ...closure, ...part } : closure)));

  return (
    <form onSubmit={onSubmit} className={styles.form} noValidate>
      {groups.map(({ title, fields: own }) => (
        <fieldset key={title}>
          <legend>{title}</legend>
          <div className={styles.pair}>
            {own.map(({ path, label }) => (
              <PlainInput
                key={path}
                label={label}
                inputMode="decimal"
                autoComplete="off"
                value={texts[path]}
                error={errorAt(path)}
                onChange={(event) => setTexts({ ...texts, [path]: event.target.value })}
              />
            ))}
          </div>
        </fieldset>
      ))}
      {seasons.map((season, at) => (
        <fieldset key={season.id}>
          <legend>Season: {season.name}</legend>
          <div className={styles.pair}>
            <PlainInput
              label="From, month and day"
              placeholder="03-01"
              value={season.fromDay}
              onChange={(event) => changeSeason(at, { fromDay: event.target.value })}
            />
            <PlainInput
              label="Until, month and day"
              placeholder="05-15"
              value={season.untilDay}
              onChange={(event) => changeSeason(at, { untilDay: event.target.value })}
            />
            <PlainInput
              label="Berths"
              inputMode="numeric"
              value={String(season.berths)}
              onChange={(event) => changeSeason(at, { berths: Number(event.target.value) })}
            />
            <PlainInput
              label="Rigger hours in it"
              inputMode="numeric"
              value={String(season.hours)}
              onChange={(event) => changeSeason(at, { hours: Number(event.target.value) })}
            />
          </div>
        </fieldset>
      ))}
      {closures.map((closure, at) => (
        <fieldset key={at}>
          <legend>Closure {at + 1}</legend>
          <div className={styles.pair}>
            <PlainInput
              label="From"
              type="date"
              value={closure.fromOn}
              onChange={(event) => changeClosure(at, { fromOn: event.target.value })}
            />
            <PlainInput
              label="Until"
              type="date"
              value={closure.untilOn}
              onChange={(event) => changeClosure(at, { untilOn: event.target.value })}
            />
            <PlainInput
              label="Why"
              value={closure.reason}
              maxLength={120}
              onChange={(event) => changeClosure(at, { reason: event.target.value })}
            />
          </div>
          <div className={styles.steps}>
            <PlainButton onClick={() => setClosures(closures.filter((_, index) => index !== at))}>
              Remove closure {at + 1}
            </PlainButton>
          </div>
        </fieldset>
      ))}
      {problem && !isShown ? (
        <Attention role="alert">{placeOf(problem.path) + problem.message}</Attention>
      ) : null}
      {save.error ? <Attention role="alert">{save.error.message}</Attention> : null}
      <div className={styles.steps}>
        <PlainButton onClick={() => setClosures([...closures, { fromOn: '', untilOn: '', reason: '' }])}>
          Add a closure
        </PlainButton>
        <PlainButton type="submit" weight="primary" disabled={save.isPending}>
          {save.isPending ? 'Saving…' : 'Save the terms'}
        </PlainButton>
        <span role="status">{save.isSuccess ? 'Saved. The next plan is made with these terms.' : ''}</span>
      </div>
    </form>
  );
}

/** Where a refusal belongs that has no figure of its own. */
function placeOf(path: string): string {
  const [list, at] = path.split('.');
  if (at === undefined) return '';
  if (list === 'closures') return `Closure ${Number(at) + 1}: `;
  return list === 'seasons' ? `Season ${Number(at) + 1}: ` : '';
}
