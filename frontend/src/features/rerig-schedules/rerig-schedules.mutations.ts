import {
  rerigScheduleSchema,
  type AnswerPlanInput,
  type MoveScheduleInput,
  type RequestPlanInput,
  type RerigScheduleDto,
  type ScheduleSettingsInput,
} from '@stayledger/shared/contracts/rerig-schedules';
import { yardTermsReplySchema, type StateYardTermsInput } from '@stayledger/shared/contracts/yard-terms';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { apiSend } from '../../lib/api-client';
import { isApiError } from '../../lib/api-error';
import { rerigQueries } from './rerig-schedules.queries';

/** One step of a person on the schedule of a vessel. */
export type ScheduleStep =
  | { step: 'plan'; input: RequestPlanInput }
  | { step: 'settings'; input: ScheduleSettingsInput }
  | { step: 'undo'; input: { version: number } }
  | { step: 'state'; input: MoveScheduleInput }
  | { step: 'answer'; input: AnswerPlanInput };

function send(vesselId: string, { step, input }: ScheduleStep): Promise<RerigScheduleDto> {
  const path = `/vessels/${vesselId}/rerig-schedule/${step === 'plan' ? 'plans' : step}`;
  return apiSend(step === 'settings' ? 'PUT' : 'POST', path, rerigScheduleSchema, { body: input });
}

/** Takes a step and shows the schedule as the server has it then; after a conflict it is fetched again. */
export function useScheduleStep(vesselId: string) {
  const queryClient = useQueryClient();
  const { queryKey } = rerigQueries.ofVessel(vesselId);
  return useMutation({
    mutationFn: (step: ScheduleStep) => send(vesselId, step),
    onSuccess: (schedule) => queryClient.setQueryData(queryKey, schedule),
    onError: (error) => {
      if (isApiError(error, 'version-conflict')) void queryClient.invalidateQueries({ queryKey });
    },
  });
}

export function stateYardTerms(input: StateYardTermsInput) {
  return apiSend('PUT', '/yard-terms', yardTermsReplySchema, { body: input });
}
