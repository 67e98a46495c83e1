import {
  importedRigSchema,
  rigCsvSchema,
  rigSchema,
  type ApplyTemplateInput,
  type CreatePairInput,
  type ImportRigInput,
} from '@stayledger/shared/contracts/rig';
import { vesselSchema, type CreateSisterInput } from '@stayledger/shared/contracts/vessels';
import { apiGet, apiSend } from '../../lib/api-client';

export function applyTemplate(vesselId: string, input: ApplyTemplateInput, idempotencyKey: string) {
  return apiSend('POST', `/vessels/${vesselId}/rig/template`, rigSchema, { body: input, idempotencyKey });
}

export function addPair(vesselId: string, input: CreatePairInput, idempotencyKey: string) {
  return apiSend('POST', `/vessels/${vesselId}/position-pairs`, rigSchema, { body: input, idempotencyKey });
}

/** No key: asked twice, what is on the rig already is left alone. */
export function importRig(vesselId: string, input: ImportRigInput) {
  return apiSend('POST', `/vessels/${vesselId}/rig/csv`, importedRigSchema, { body: input });
}

export function rigCsv(vesselId: string) {
  return apiGet(`/vessels/${vesselId}/rig/csv`, rigCsvSchema);
}

export function createSister(vesselId: string, input: CreateSisterInput, idempotencyKey: string) {
  return apiSend('POST', `/vessels/${vesselId}/sisters`, vesselSchema, { body: input, idempotencyKey });
}
