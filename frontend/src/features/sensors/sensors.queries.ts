import { loadBasesSchema } from '@stayledger/shared/contracts/rig';
import {
  sensorListSchema,
  sensorSchema,
  type AddSensorEventInput,
  type AddSensorInput,
  type UpdateSensorInput,
} from '@stayledger/shared/contracts/sensors';
import { queryOptions } from '@tanstack/react-query';
import { apiGet, apiSend } from '../../lib/api-client';

export const sensorQueries = {
  ofVessel: (vesselId: string) =>
    queryOptions({
      queryKey: ['sensors', vesselId] as const,
      queryFn: ({ signal }) => apiGet(`/vessels/${vesselId}/sensors`, sensorListSchema, { signal }),
    }),
  loadBases: (vesselId: string) =>
    queryOptions({
      queryKey: ['sensors', vesselId, 'load-bases'] as const,
      queryFn: ({ signal }) => apiGet(`/vessels/${vesselId}/load-bases`, loadBasesSchema, { signal }),
    }),
};

export function addSensor(vesselId: string, input: AddSensorInput, idempotencyKey: string) {
  return apiSend('POST', `/vessels/${vesselId}/sensors`, sensorSchema, { body: input, idempotencyKey });
}

export function updateSensor(sensorId: string, input: UpdateSensorInput) {
  return apiSend('PATCH', `/sensors/${sensorId}`, sensorSchema, { body: input });
}

export function addSensorEvent(sensorId: string, input: AddSensorEventInput, idempotencyKey: string) {
  return apiSend('POST', `/sensors/${sensorId}/events`, sensorSchema, { body: input, idempotencyKey });
}
