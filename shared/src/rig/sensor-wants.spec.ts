import { describe, expect, it } from 'vitest';
import { sensorWants, type SensorForWants } from './sensor-wants.js';

const zero = { kind: 'zero-check', doneOn: '2027-03-01', rigState: 'slack', statedTensionKn: null } as const;
const calibration = {
  kind: 'calibration',
  doneOn: '2026-01-01',
  rigState: null,
  statedTensionKn: null,
} as const;
const whole: SensorForWants = {
  kind: 'pin',
  position: 'p',
  fullScaleKn: 100,
  errorPercent: 0.5,
  scale: null,
  removedOn: null,
  events: [zero, calibration],
  todayOn: '2027-07-01',
};

describe('what a sensor wants', () => {
  it('is nothing when everything is recorded, or when it was taken off', () => {
    expect(sensorWants(whole)).toEqual([]);
    expect(sensorWants({ ...whole, events: [], position: null, removedOn: '2027-01-01' })).toEqual([]);
  });

  it('is a zero check after six months and a calibration after two years, to the day', () => {
    const on = (todayOn: string) => sensorWants({ ...whole, todayOn }).length;
    expect(on('2027-09-01')).toBe(0);
    expect(on('2027-09-02')).toBe(1);
    expect(on('2028-01-01')).toBe(1);
    expect(on('2028-01-02')).toBe(2);
  });

  it('is the tension where the zero was taken under dock tune', () => {
    const tuned = { ...zero, rigState: 'dock-tune' } as const;
    expect(sensorWants({ ...whole, events: [tuned, calibration] })[0]).toContain('tension');
    expect(sensorWants({ ...whole, events: [{ ...tuned, statedTensionKn: 8 }, calibration] })).toEqual([]);
  });

  it.each(['ram-pressure', 'strain', 'raw'] as const)('is a scale for the kind %s', (kind) => {
    expect(sensorWants({ ...whole, kind })).toHaveLength(1);
    expect(sensorWants({ ...whole, kind, scale: {} })).toEqual([]);
  });

  it('names all of it for a sensor just unpacked', () => {
    const bare = { ...whole, position: null, fullScaleKn: null, errorPercent: null, events: [] };
    expect(sensorWants(bare)).toHaveLength(4);
  });
});
