import {
  listedConstructionSchema,
  type AddConstructionInput,
  type ReviseConstructionInput,
} from '@stayledger/shared/contracts/constructions';
import {
  listedCurveSchema,
  type AddCurveInput,
  type ReviseCurveInput,
} from '@stayledger/shared/contracts/curves';
import { apiSend } from '../../lib/api-client';

export function addCurve(input: AddCurveInput, idempotencyKey: string) {
  return apiSend('POST', '/curves', listedCurveSchema, { body: input, idempotencyKey });
}

export function reviseCurve(curveId: string, input: ReviseCurveInput, idempotencyKey: string) {
  return apiSend('POST', `/curves/${encodeURIComponent(curveId)}/versions`, listedCurveSchema, {
    body: input,
    idempotencyKey,
  });
}

export function addConstruction(input: AddConstructionInput, idempotencyKey: string) {
  return apiSend('POST', '/constructions', listedConstructionSchema, { body: input, idempotencyKey });
}

export function reviseConstruction(
  constructionId: string,
  input: ReviseConstructionInput,
  idempotencyKey: string,
) {
  return apiSend(
    'POST',
    `/constructions/${encodeURIComponent(constructionId)}/versions`,
    listedConstructionSchema,
    { body: input, idempotencyKey },
  );
}
