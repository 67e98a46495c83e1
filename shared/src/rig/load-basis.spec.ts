import { describe, expect, it } from 'vitest';
import { isTwin, loadBases, type PlaceWithLoads } from './load-basis.js';

const place = (id: string, kind: string, side: PlaceWithLoads['side'], mast = 'main'): PlaceWithLoads => ({
  id,
  kind,
  side,
  mast,
  label: `${kind} ${side} ${mast}`,
});
const port = place('p', 'cap-shroud', 'port');
const starboard = place('s', 'cap-shroud', 'starboard');
const mizzen = place('m', 'cap-shroud', 'starboard', 'mizzen');
const backstay = place('b', 'backstay', 'centre');
const halyard = place('h', 'halyard', 'centre');
const all = [port, starboard, mizzen, backstay, halyard];
const pin = { name: 'Pin A', positionId: 'p', inLine: [] as string[] };

describe('where loads can come from', () => {
  it('is a sensor of its own, then its twin, never another mast', () => {
    const found = loadBases(all, [pin]);
    expect(found.map(({ basis }) => basis)).toEqual(['measured', 'mirrored', 'none', 'none', 'none']);
    expect(found[1].throughPositionId).toBe('p');
    expect(found[1].words).toContain('both tacks');
  });

  it('follows a stated line of load before a mirror', () => {
    const found = loadBases(all, [{ ...pin, inLine: ['s', 'b'] }]);
    expect(found.map(({ basis }) => basis)).toEqual(['measured', 'in-line', 'none', 'in-line', 'none']);
    expect(found[3].throughPositionId).toBe('p');
  });

  it('says what would help, except where nothing is to be assessed', () => {
    const found = loadBases(all, []);
    expect(found.every(({ basis }) => basis === 'none')).toBe(true);
    expect(found[0].improve).toContain(starboard.label);
    expect(found[3].improve).toContain('ram');
    expect(found[4].improve).toBeNull();
  });
});

describe('twins', () => {
  it('are the same stay of the same mast on the other side', () => {
    expect(isTwin(port, starboard)).toBe(true);
    expect(isTwin(port, port)).toBe(false);
    expect(isTwin(port, mizzen)).toBe(false);
    expect(isTwin(backstay, backstay)).toBe(false);
  });
});
