import type { WorkingStepDto } from '@stayledger/shared/contracts/life';
import { useState } from 'react';
import { Attention } from '../../components/feedback/attention';
import { PlainButton } from '../../components/plain-button/plain-button';
import { DataTable, type DataTableColumn } from '../../components/tables/data-table';
import { useFormat } from '../../lib/formatting/use-format';
import { evaluateStep, type StepCheck } from './evaluate-step';
import styles from './part-life.module.css';

type Input = WorkingStepDto['inputs'][number];

/** From the log to the date, one equation after the other, with the figures that went in and where they come from. */
export function Working({ steps }: { steps: readonly WorkingStepDto[] }) {
  const format = useFormat();
  const [checks, setChecks] = useState<StepCheck[] | null>(null);
  const [isChecking, setIsChecking] = useState(false);
  const [complaint, setComplaint] = useState<string | null>(null);
  if (steps.length === 0) {
    return <p>The working stands here once a log is posted for a detail that has a curve.</p>;
  }
  const columns: DataTableColumn<Input>[] = [
    { key: 'symbol', title: 'Symbol', render: (input) => input.symbol },
    { key: 'meaning', title: 'Meaning', render: (input) => input.meaning },
    {
      key: 'value',
      title: 'Value',
      numeric: true,
      render: (input) =>
        `${format.scientific(input.value, 4)}${input.unit === '' ? '' : `\u00a0${input.unit}`}`,
    },
    { key: 'from', title: 'From', render: (input) => input.from },
  ];

  async function check(): Promise<void> {
    setIsChecking(true);
    setComplaint(null);
    try {
      setChecks(await Promise.all(steps.map((step) => evaluateStep(step))));
    } catch {
      setComplaint('The calculator could not be loaded. Check the connection and press the button again.');
    } finally {
      setIsChecking(false);
    }
  }
  return (
    <>
      <p>
        Figures are those of the governing detail. They can be worked out again in this browser, by a
        calculator that shares nothing with the server.
      </p>
      <p>
        <PlainButton onClick={() => void check()} disabled={isChecking}>
          {isChecking ? 'Working it out…' : 'Work it out again here'}
        </PlainButton>
      </p>
      {complaint !== null && <Attention role="alert">{complaint}</Attention>}
      <ol className={styles.steps}>
        {steps.map((step, index) => (
          <li key={step.title}>
            <h3>{step.title}</h3>
            <code
              className={styles.equation}
              tabIndex={0}
              role="group"
              aria-label={`Equation of step ${index + 1}`}
            >
              {step.equation}
            </code>
            {step.inputs.length > 0 && (
              <DataTable
                caption={`Figures of step ${index + 1}`}
                rows={step.inputs}
                columns={columns}
                rowKey={(input) => input.symbol}
              />
            )}
            <p className={styles.result}>
              {step.result.symbol} = {format.scientific(step.result.value, 4)}
              {step.result.unit === '' ? '' : `\u00a0${step.result.unit}`}
            </p>
            {checks !== null && <CheckLine check={checks[index]} />}
            <p className={styles.note}>{step.source}</p>
          </li>
        ))}
      </ol>
    </>
  );
}

function CheckLine({ check }: { check: StepCheck }) {
  const format = useFormat();
  if (check.kind === 'not-computable') return <p role="status">{check.reason}</p>;
  if (check.agrees) {
    return <p role="status">Worked out here: {format.scientific(check.value, 4)}, the same as above.</p>;
  }
  return (
    <Attention role="status">
      Worked out here: {format.scientific(check.value, 4)}. That is not the figure above: please report this
      page.
    </Attention>
  );
}
