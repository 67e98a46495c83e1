import {
  assemblySchema,
  fittedPartSchema,
  type DescribedPartInput,
  type FitPartInput,
  type RemovePartInput,
  type UpdatePartInput,
} from '@stayledger/shared/contracts/parts';
import {
  positionSchema,
  type CreatePositionInput,
  type UpdatePositionInput,
} from '@stayledger/shared/contracts/rig';
import { apiSend } from '../../lib/api-client';

export function addPosition(vesselId: string, input: CreatePositionInput, idempotencyKey: string) {
  return apiSend('POST', `/vessels/${vesselId}/positions`, positionSchema, { body: input, idempotencyKey });
}

export function updatePosition(positionId: string, input: UpdatePositionInput) {
  return apiSend('PATCH', `/positions/${positionId}`, positionSchema, { body: input });
}

export function fitPart(positionId: string, input: FitPartInput, idempotencyKey: string) {
  return apiSend('POST', `/positions/${positionId}/parts`, fittedPartSchema, { body: input, idempotencyKey });
}

export function updatePart(partId: string, input: UpdatePartInput) {
  return apiSend('PATCH', `/parts/${partId}`, fittedPartSchema, { body: input });
}

export function removePart(partId: string, input: RemovePartInput, idempotencyKey: string) {
  return apiSend('POST', `/parts/${partId}/remove`, fittedPartSchema, { body: input, idempotencyKey });
}

/** How strong a part would be as described; stores nothing. */
export function partStrength(input: DescribedPartInput) {
  return apiSend('POST', '/part-strengths', assemblySchema, { body: input });
}
