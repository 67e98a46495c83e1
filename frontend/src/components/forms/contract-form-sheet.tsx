import Form from 'antd/es/form';
import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { isApiError } from '../../lib/api-error';
import { Attention } from '../feedback/attention';
import { PlainButton } from '../plain-button/plain-button';
import styles from './forms.module.css';
import type { ContractForm } from './use-contract-form';

interface ContractFormSheetProps<Values> {
  /** Names the form for its ids; one a page. */
  name: string;
  contractForm: ContractForm<Values>;
  initialValues: Partial<Values>;
  submitLabel: string;
  cancelTo: string;
  /** Renders what is stored now, on a version conflict. */
  onReload?: () => void;
  /** Said where the page stays after saving. */
  doneText?: string;
  children: ReactNode;
}

/** Frame of every plain form: fields, what was refused, the two ways out. */
export function ContractFormSheet<Values extends object>({
  name,
  contractForm,
  initialValues,
  submitLabel,
  cancelTo,
  onReload,
  doneText,
  children,
}: ContractFormSheetProps<Values>) {
  const { form, submit, pending, problem } = contractForm;
  return (
    <Form<Values>
      form={form}
      name={name}
      layout="vertical"
      className={styles.sheet}
      initialValues={initialValues}
      onFinish={submit}
      requiredMark={false}
      scrollToFirstError={{ focus: true }}
      disabled={pending}
    >
      {children}
      {problem ? <Refusal problem={problem} onReload={onReload} /> : null}
      <div className={styles.actions}>
        <PlainButton type="submit" weight="primary" disabled={pending}>
          {pending ? 'Saving…' : submitLabel}
        </PlainButton>
        <Link to={cancelTo} className={styles.cancel}>
          Cancel
        </Link>
        <span role="status">{doneText}</span>
      </div>
    </Form>
  );
}

function Refusal({ problem, onReload }: { problem: Error; onReload?: () => void }) {
  const conflict = isApiError(problem, 'version-conflict');
  return (
    <div className={styles.refusal}>
      <Attention role="alert">
        {problem.message}
        {isApiError(problem) && problem.status >= 500 ? (
          <span className="soft"> Request {problem.requestId}.</span>
        ) : null}
      </Attention>
      {conflict && onReload ? <PlainButton onClick={onReload}>Show what is stored now</PlainButton> : null}
    </div>
  );
}
