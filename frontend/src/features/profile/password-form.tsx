import { changePasswordSchema } from '@stayledger/shared/contracts/users';
import { useState } from 'react';
import { paths } from '../../app/paths';
import { ContractFormSheet } from '../../components/forms/contract-form-sheet';
import { TextField } from '../../components/forms/fields';
import { useContractForm } from '../../components/forms/use-contract-form';
import { apiSend } from '../../lib/api-client';
import { useRefreshSession } from '../../lib/session';

interface PasswordValues {
  currentPassword: string;
  newPassword: string;
}

export function PasswordForm() {
  const refreshSession = useRefreshSession();
  const [changed, setChanged] = useState(false);
  const contractForm = useContractForm({
    contract: changePasswordSchema,
    toInput: (values: PasswordValues) => values,
    send: (input) => apiSend('POST', '/users/me/password', null, { body: input }),
    onDone: async () => {
      contractForm.form.resetFields();
      setChanged(true);
      await refreshSession();
    },
  });
  return (
    <ContractFormSheet<PasswordValues>
      name="password"
      contractForm={contractForm}
      initialValues={{ currentPassword: '', newPassword: '' }}
      submitLabel="Change password"
      cancelTo={paths.home.pattern}
      doneText={changed ? 'Changed. Other sign-ins of yours have ended.' : undefined}
    >
      <TextField
        name="currentPassword"
        label="Password now"
        type="password"
        autoComplete="current-password"
        required="Write the password you have now."
        maxLength={1024}
      />
      <TextField
        name="newPassword"
        label="New password"
        type="password"
        autoComplete="new-password"
        required="Write a new password."
        hint="At least 12 characters; a few words in a row are easy to keep."
        maxLength={1024}
      />
    </ContractFormSheet>
  );
}
