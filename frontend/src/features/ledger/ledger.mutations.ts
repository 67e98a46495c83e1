import { ledgerCheckSchema } from '@stayledger/shared/contracts/ledger';
import { useMutation } from '@tanstack/react-query';
import { apiSend } from '../../lib/api-client';

/** Has the server check the ledger of a vessel. It changes no entry; that somebody checked is noted. */
export function useLedgerCheck(vesselId: string) {
  return useMutation({
    mutationFn: () => apiSend('POST', `/vessels/${vesselId}/ledger/check`, ledgerCheckSchema),
  });
}
