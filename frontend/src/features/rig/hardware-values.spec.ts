import { describe, expect, it } from 'vitest';
import { hardwareOf, hardwareValues } from './hardware-values';

const asText = (kn: number) => String(kn);
const asIs = (value: number) => value;

describe('hardware in a form', () => {
  it('says nothing while nobody said anything', () => {
    expect(hardwareOf(hardwareValues(null, asText), asIs)).toBeNull();
  });

  it('comes back as it was stored', () => {
    const stored = {
      turnbuckle: { there: true, breakingLoadKn: 61.5 },
      toggle: { there: false, breakingLoadKn: null },
      pin: { there: true, breakingLoadKn: null },
      chainplate: { there: true, breakingLoadKn: 80 },
      upperArticulation: 'both-planes' as const,
      lowerArticulation: null,
    };
    expect(hardwareOf(hardwareValues(stored, asText), asIs)).toEqual(stored);
  });

  it('converts the unit, and forgets the load of an element that is not there', () => {
    const values = hardwareValues(null, asText);
    const typed = {
      ...values,
      pin: { there: 'yes' as const, load: '10,5' },
      toggle: { there: 'no' as const, load: '9' },
    };
    const hardware = hardwareOf(typed, (value) => value * 2);
    expect(hardware?.pin.breakingLoadKn).toBe(21);
    expect(hardware?.toggle).toEqual({ there: false, breakingLoadKn: null });
  });
});
