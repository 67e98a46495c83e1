import { usagePlanReplySchema, type StateUsagePlanInput } from '@stayledger/shared/contracts/life';
import {
  vesselSchema,
  type CreateVesselInput,
  type UpdateVesselInput,
} from '@stayledger/shared/contracts/vessels';
import { apiSend } from '../../lib/api-client';

export function registerVessel(input: CreateVesselInput, idempotencyKey: string) {
  return apiSend('POST', '/vessels', vesselSchema, { body: input, idempotencyKey });
}

export function updateVessel(vesselId: string, input: UpdateVesselInput) {
  return apiSend('PATCH', `/vessels/${vesselId}`, vesselSchema, { body: input });
}

export function stateUsagePlan(vesselId: string, input: StateUsagePlanInput) {
  return apiSend('PUT', `/vessels/${vesselId}/usage-plan`, usagePlanReplySchema, { body: input });
}
