import {
  detailChoiceEffectSchema,
  detailChoicesSchema,
  type ChooseDetailInput,
  type PreviewDetailChoiceInput,
} from '@stayledger/shared/contracts/detail-choices';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { apiSend } from '../../lib/api-client';

/** Asks what a choice would do; the server writes nothing. */
export function usePreviewDetailChoice(partId: string, detailKey: string) {
  return useMutation({
    mutationFn: (input: PreviewDetailChoiceInput) =>
      apiSend('POST', `/parts/${partId}/detail-choices/${detailKey}/preview`, detailChoiceEffectSchema, {
        body: input,
      }),
  });
}

export function useChooseDetail(partId: string, detailKey: string, onDone: () => void | Promise<void>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: ChooseDetailInput) =>
      apiSend('PUT', `/parts/${partId}/detail-choices/${detailKey}`, detailChoicesSchema, { body: input }),
    // A choice moves standings, dates and accounts on nearly every other screen.
    onSuccess: async () => {
      await onDone();
      await client.invalidateQueries();
    },
  });
}
