import { FORCE_UNITS, type Preferences } from '@stayledger/shared/contracts/auth';
import { updateProfileSchema } from '@stayledger/shared/contracts/users';
import Form from 'antd/es/form';
import Radio from 'antd/es/radio';
import { paths } from '../../app/paths';
import { ContractFormSheet } from '../../components/forms/contract-form-sheet';
import { FieldPair } from '../../components/forms/field-pair';
import { ChoiceField, TextField } from '../../components/forms/fields';
import { useContractForm } from '../../components/forms/use-contract-form';
import { apiSend } from '../../lib/api-client';
import { forceUnitName } from '../../lib/formatting/format';
import { useRefreshSession, useSession } from '../../lib/session';
import { useColourMode } from '../../theme/colour-mode';

interface ProfileValues extends Omit<Preferences, 'decimalComma'> {
  name: string;
  decimalMark: 'point' | 'comma';
}

interface ProfileFormProps {
  /** Kept by the page: saving makes a new version, and with it a new form. */
  saved: boolean;
  onSaved: (saved: boolean) => void;
}

export function ProfileForm({ saved, onSaved }: ProfileFormProps) {
  const { user } = useSession();
  const refreshSession = useRefreshSession();
  const { choose } = useColourMode();
  const contractForm = useContractForm({
    contract: updateProfileSchema,
    toInput: ({ name, decimalMark, ...preferences }: ProfileValues) => ({
      version: user.version,
      name,
      preferences: { ...preferences, decimalComma: decimalMark === 'comma' },
    }),
    send: async (input) => {
      onSaved(false);
      await apiSend('PATCH', '/users/me', null, { body: input });
      return input;
    },
    onDone: async (input) => {
      if (input.preferences?.theme) choose(input.preferences.theme);
      await refreshSession();
      onSaved(true);
    },
  });
  return (
    <ContractFormSheet<ProfileValues>
      name="profile"
      contractForm={contractForm}
      initialValues={{
        name: user.name,
        forceUnit: user.preferences.forceUnit,
        lengthUnit: user.preferences.lengthUnit,
        decimalMark: user.preferences.decimalComma ? 'comma' : 'point',
        theme: user.preferences.theme,
      }}
      submitLabel="Save profile"
      cancelTo={paths.home.pattern}
      onReload={() => void refreshSession()}
      doneText={saved ? 'Saved.' : undefined}
    >
      <TextField name="name" label="Name" required="Write your name." maxLength={120} autoComplete="name" />
      <FieldPair>
        <ChoiceField
          name="forceUnit"
          label="Loads in"
          required="Choose a unit."
          choices={FORCE_UNITS.map((value) => ({ value, label: forceUnitName(value) }))}
        />
        <ChoiceField
          name="lengthUnit"
          label="Lengths in"
          required="Choose a unit."
          choices={[
            { value: 'm', label: 'metres (m)' },
            { value: 'ft', label: 'feet (ft)' },
          ]}
        />
      </FieldPair>
      <Form.Item
        name="decimalMark"
        label="Decimal mark"
        extra="How figures are written. Typed figures are read either way."
      >
        <Radio.Group
          options={[
            { value: 'point', label: 'Point: 12.5' },
            { value: 'comma', label: 'Comma: 12,5' },
          ]}
        />
      </Form.Item>
      <Form.Item name="theme" label="Appearance">
        <Radio.Group
          options={[
            { value: 'system', label: 'As the system' },
            { value: 'light', label: 'Light' },
            { value: 'dark', label: 'Night watch' },
          ]}
        />
      </Form.Item>
    </ContractFormSheet>
  );
}
