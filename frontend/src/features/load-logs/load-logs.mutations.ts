import {
  loadLogSchema,
  type CreateLoadLogInput,
  type LoadLogDto,
  type PostLoadLogInput,
  type RecountLoadLogInput,
  type ReverseLoadLogInput,
  type SetAsideLoadLogInput,
} from '@stayledger/shared/contracts/load-logs';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { apiSend } from '../../lib/api-client';
import { loadLogQueries } from './load-logs.queries';

/** Announces a file; its bytes follow over the upload address. */
export function createLoadLog(
  vesselId: string,
  input: CreateLoadLogInput,
  idempotencyKey: string,
): Promise<LoadLogDto> {
  return apiSend('POST', `/vessels/${vesselId}/load-logs`, loadLogSchema, { body: input, idempotencyKey });
}

function useLogDecision<Input>(loadLogId: string, send: (input: Input) => Promise<LoadLogDto>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: send,
    onSuccess: async (log) => {
      client.setQueryData(loadLogQueries.detail(loadLogId).queryKey, log);
      // Posting changes standings, dates and accounts on nearly every other screen.
      await client.invalidateQueries();
    },
    // A refusal usually means that somebody else acted first; the page then shows what is true now.
    onError: () => client.invalidateQueries({ queryKey: loadLogQueries.all() }),
  });
}

export function usePostLoadLog(loadLogId: string) {
  return useLogDecision(loadLogId, (input: PostLoadLogInput & { idempotencyKey: string }) =>
    apiSend('POST', `/load-logs/${loadLogId}/post`, loadLogSchema, {
      body: { version: input.version },
      idempotencyKey: input.idempotencyKey,
    }),
  );
}

export function useSetAsideLoadLog(loadLogId: string) {
  return useLogDecision(loadLogId, (input: SetAsideLoadLogInput & { idempotencyKey: string }) =>
    apiSend('POST', `/load-logs/${loadLogId}/set-aside`, loadLogSchema, {
      body: { version: input.version, reason: input.reason },
      idempotencyKey: input.idempotencyKey,
    }),
  );
}

export function useReverseLoadLog(loadLogId: string) {
  return useLogDecision(loadLogId, (input: ReverseLoadLogInput & { idempotencyKey: string }) =>
    apiSend('POST', `/load-logs/${loadLogId}/reverse`, loadLogSchema, {
      body: { version: input.version, reason: input.reason },
      idempotencyKey: input.idempotencyKey,
    }),
  );
}

export function useRecountLoadLog(loadLogId: string) {
  return useLogDecision(loadLogId, (input: RecountLoadLogInput & { idempotencyKey: string }) =>
    apiSend('POST', `/load-logs/${loadLogId}/recount`, loadLogSchema, {
      body: { version: input.version, mapping: input.mapping },
      idempotencyKey: input.idempotencyKey,
    }),
  );
}
