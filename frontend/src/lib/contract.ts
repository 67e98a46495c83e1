/** As much of a contract schema as the browser uses; the schemas themselves come from @stayledger/shared/contracts. */
export interface Contract<Output> {
  /** Carries the type of what a parsed value is. */
  readonly _zod: { readonly output: Output };
  safeParse: (value: unknown) => {
    success: boolean;
    data?: unknown;
    error?: { issues: readonly ContractIssue[] };
  };
}

export interface ContractIssue {
  code?: string;
  path: readonly PropertyKey[];
  message: string;
}

export type Checked<Output> = { ok: true; value: Output } | { ok: false; issues: readonly ContractIssue[] };

/** Checks a value by its contract. */
export function check<Output>(contract: Contract<Output>, value: unknown): Checked<Output> {
  const parsed = contract.safeParse(value);
  // The schema's own type says what `data` is once it has succeeded.
  if (parsed.success) return { ok: true, value: parsed.data as Output };
  return { ok: false, issues: parsed.error?.issues ?? [] };
}
