import { stateUsagePlanSchema, type UsagePlanDto } from '@stayledger/shared/contracts/life';
import { ContractFormSheet } from '../../components/forms/contract-form-sheet';
import { figureOf, figureText, NumberField, TextField } from '../../components/forms/fields';
import { useContractForm } from '../../components/forms/use-contract-form';
import { usePreferences } from '../../lib/session';
import { stateUsagePlan } from './vessels.mutations';

interface UsagePlanValues {
  sailingHoursPerYear: string;
  note: string;
}

interface UsagePlanFormProps {
  vesselId: string;
  plan: UsagePlanDto | null;
  cancelTo: string;
  onDone: () => void | Promise<void>;
  onReload: () => void;
}

/** How much the vessel will sail: what turns an allowance used so far into a date. */
export function UsagePlanForm({ vesselId, plan, cancelTo, onDone, onReload }: UsagePlanFormProps) {
  const { decimalComma } = usePreferences();
  const contractForm = useContractForm({
    contract: stateUsagePlanSchema,
    toInput: (values: UsagePlanValues) => ({
      version: plan?.version,
      sailingHoursPerYear: figureOf(values.sailingHoursPerYear),
      note: values.note,
    }),
    send: (input) => stateUsagePlan(vesselId, input),
    onDone,
  });
  return (
    <ContractFormSheet<UsagePlanValues>
      name="usage-plan"
      contractForm={contractForm}
      initialValues={{
        sailingHoursPerYear: figureText(plan?.sailingHoursPerYear, decimalComma),
        note: plan?.note ?? '',
      }}
      submitLabel="State the plan"
      cancelTo={cancelTo}
      onReload={onReload}
    >
      <NumberField
        name="sailingHoursPerYear"
        label="Hours under sail in a year"
        unit="h"
        required="Say how many hours it will sail in a year."
        hint="Count the hours with sails drawing: a summer of weekends is about 150 to 300, a charter season 800 to 1500 (common practice, no source)."
      />
      <TextField
        name="note"
        label="What the plan rests on"
        lines={2}
        maxLength={1000}
        hint="Such as the logbook of last season, or a charter calendar."
      />
    </ContractFormSheet>
  );
}
