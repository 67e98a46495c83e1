import {
  createPositionSchema,
  updatePositionSchema,
  type PositionDto,
} from '@stayledger/shared/contracts/rig';
import { POSITION_KINDS, positionKind, positionLabel } from '@stayledger/shared/rig/positions';
import Form from 'antd/es/form';
import { ContractFormSheet } from '../../components/forms/contract-form-sheet';
import { FieldPair } from '../../components/forms/field-pair';
import { ChoiceField, TextField } from '../../components/forms/fields';
import { useContractForm } from '../../components/forms/use-contract-form';
import { addPosition, updatePosition } from './rig.mutations';

interface PositionValues {
  kind: string;
  side: PositionDto['side'];
  mast: string;
  label: string;
}

interface PositionFormProps {
  vesselId: string;
  position?: PositionDto;
  cancelTo: string;
  onDone: (position: PositionDto) => void | Promise<void>;
  onReload?: () => void;
}

const MASTS = [
  { value: 'main', label: 'Main mast' },
  { value: 'fore', label: 'Fore mast' },
  { value: 'mizzen', label: 'Mizzen mast' },
];
const SIDE_WORDS = { port: 'Port', starboard: 'Starboard', centre: 'Centre line' } as const;

export function PositionForm({ vesselId, position, cancelTo, onDone, onReload }: PositionFormProps) {
  const adding = useContractForm({
    contract: createPositionSchema,
    toInput: ({ label, ...rest }: PositionValues) => ({ ...rest, label: label.trim() || undefined }),
    send: (input, key) => addPosition(vesselId, input, key),
    onDone,
  });
  const changing = useContractForm({
    contract: updatePositionSchema,
    toInput: (values: PositionValues) => ({
      ...values,
      label: values.label.trim() || positionLabel(values.kind, values.side, values.mast),
      version: position?.version,
    }),
    send: (input) => updatePosition(position?.id ?? '', input),
    onDone,
  });
  const contractForm = position ? changing : adding;
  const kind = Form.useWatch('kind', contractForm.form);
  const side = Form.useWatch('side', contractForm.form);
  const mast = Form.useWatch('mast', contractForm.form);
  const chosen = kind ? positionKind(kind) : undefined;
  const sides = chosen?.sides ?? (['port', 'starboard', 'centre'] as const);
  const fits = (candidate: PositionDto['side']) => sides.some((known) => known === candidate);

  return (
    <ContractFormSheet<PositionValues>
      name="position"
      contractForm={contractForm}
      initialValues={{
        kind: position?.kind,
        side: position?.side,
        mast: position?.mast ?? 'main',
        label: position?.label ?? '',
      }}
      submitLabel={position ? 'Save position' : 'Add position'}
      cancelTo={cancelTo}
      onReload={onReload}
    >
      <ChoiceField
        name="kind"
        label="Place on the rig"
        required="Choose the place."
        searchable
        hint={chosen?.note}
        choices={[
          { label: 'Standing rigging', options: kindChoices(true) },
          { label: 'Running rigging (registered, not assessed)', options: kindChoices(false) },
        ]}
        onChange={(next) => {
          const nextSides = positionKind(next)?.sides ?? [];
          const current = contractForm.form.getFieldValue('side') as PositionDto['side'] | undefined;
          if (!current || !nextSides.includes(current)) {
            contractForm.form.setFieldValue('side', nextSides.length === 1 ? nextSides[0] : undefined);
          }
        }}
      />
      <FieldPair>
        <ChoiceField
          name="side"
          label="Side"
          required="Choose the side."
          choices={(Object.keys(SIDE_WORDS) as PositionDto['side'][])
            .filter(fits)
            .map((value) => ({ value, label: SIDE_WORDS[value] }))}
        />
        <ChoiceField
          name="mast"
          label="Mast"
          required="Choose the mast."
          choices={mastChoices(position?.mast)}
        />
      </FieldPair>
      <TextField
        name="label"
        label="Called"
        maxLength={120}
        placeholder={kind && side ? positionLabel(kind, side, mast) : undefined}
        hint="Left empty, it is called by its place and side."
      />
    </ContractFormSheet>
  );
}

function kindChoices(standing: boolean) {
  return POSITION_KINDS.filter((kind) => kind.standing === standing).map((kind) => ({
    value: kind.kind,
    label: `${kind.name.charAt(0).toUpperCase()}${kind.name.slice(1)}${kind.alias ? ` (${kind.alias})` : ''}`,
  }));
}

function mastChoices(own: string | undefined) {
  return own && !MASTS.some((mast) => mast.value === own) ? [...MASTS, { value: own, label: own }] : MASTS;
}
