import { removePartSchema, type FittedPartDto } from '@stayledger/shared/contracts/parts';
import { ContractFormSheet } from '../../components/forms/contract-form-sheet';
import { DayField, TextField } from '../../components/forms/fields';
import { useContractForm } from '../../components/forms/use-contract-form';
import { removePart } from './rig.mutations';

interface RemoveValues {
  removedOn: string;
  reason: string;
}

interface RemovePartFormProps {
  part: FittedPartDto;
  todayOn: string;
  cancelTo: string;
  onDone: (part: FittedPartDto) => void | Promise<void>;
  onReload: () => void;
}

export function RemovePartForm({ part, todayOn, cancelTo, onDone, onReload }: RemovePartFormProps) {
  const contractForm = useContractForm({
    contract: removePartSchema,
    toInput: (values: RemoveValues) => ({ ...values, version: part.version }),
    send: (input, key) => removePart(part.id, input, key),
    onDone,
  });
  return (
    <ContractFormSheet<RemoveValues>
      name="remove-part"
      contractForm={contractForm}
      initialValues={{ removedOn: todayOn, reason: '' }}
      submitLabel="Take this part off"
      cancelTo={cancelTo}
      onReload={onReload}
    >
      <DayField name="removedOn" label="Taken off on" required="Say on which day." max={todayOn} />
      <TextField
        name="reason"
        label="Why"
        required="Say why it was taken off."
        lines={2}
        maxLength={400}
        hint="Such as: re-rig, broken wire at the lower terminal, exchanged for rod."
      />
    </ContractFormSheet>
  );
}
