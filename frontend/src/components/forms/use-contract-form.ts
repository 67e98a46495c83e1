import Form from 'antd/es/form';
import type { FormInstance } from 'antd/es/form';
import { useMutation } from '@tanstack/react-query';
import { isApiError } from '../../lib/api-error';
import { check, type Contract, type ContractIssue } from '../../lib/contract';
import { useIdempotencyKey } from './use-idempotency-key';

interface ContractFormOptions<Values, Input, Reply> {
  /** Contract of the request: the form's rules are the contract's. */
  contract: Contract<Input>;
  /** What the person wrote, as the request is to carry it; units are converted here. */
  toInput: (values: Values) => unknown;
  send: (input: Input, idempotencyKey: string) => Promise<Reply>;
  onDone: (reply: Reply) => void | Promise<void>;
}

export interface ContractForm<Values> {
  form: FormInstance<Values>;
  submit: () => void;
  pending: boolean;
  /** What the server refused as a whole; refusals of one field stand at the field. */
  problem: Error | null;
}

/** A form over a contract: checked before it is sent, refusals put at their fields, focus on the first of them. */
export function useContractForm<Values extends object, Input, Reply>(
  options: ContractFormOptions<Values, Input, Reply>,
): ContractForm<Values> {
  const [form] = Form.useForm<Values>();
  const keyFor = useIdempotencyKey();
  const mutation = useMutation({
    mutationFn: (input: Input) => options.send(input, keyFor(input)),
    onSuccess: (reply) => options.onDone(reply),
    onError: (error) => {
      if (isApiError(error)) showFieldErrors(form, error.fieldErrors);
    },
  });

  return {
    form,
    submit: () => {
      // All values, not only those of fields on show: a field hidden by another one's answer keeps what it holds.
      const values = form.getFieldsValue(true) as Values;
      const checked = check(options.contract, options.toInput(values));
      if (checked.ok) mutation.mutate(checked.value);
      else showFieldErrors(form, byField(checked.issues));
    },
    pending: mutation.isPending,
    problem: mutation.error,
  };
}

function byField(issues: readonly ContractIssue[]): Record<string, string[]> {
  const fields: Record<string, string[]> = {};
  for (const issue of issues) (fields[issue.path.map(String).join('.')] ??= []).push(issue.message);
  return fields;
}

function showFieldErrors<Values>(form: FormInstance<Values>, errors: Record<string, string[]>): void {
  const known = Object.keys(form.getFieldsValue(true) as object);
  const fields = Object.entries(errors).filter(([path]) => known.includes(path.split('.')[0]));
  form.setFields(
    fields.map(([path, messages]) => ({ name: namePath(path), errors: messages })) as Parameters<
      typeof form.setFields
    >[0],
  );
  const [first] = fields;
  if (first) form.focusField(namePath(first[0]) as Parameters<typeof form.focusField>[0]);
}

/** 'channels.0.unit' as antd names it. */
function namePath(path: string): (string | number)[] {
  return path.split('.').map((part) => (/^\d+$/.test(part) ? Number(part) : part));
}
