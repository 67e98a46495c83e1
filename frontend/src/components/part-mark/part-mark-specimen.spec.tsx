import { cleanup } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { PART_MARK_STATES, SPECIMEN_SIZES, PartMarkSpecimen } from '../../testing/part-mark-specimen';
import { renderWithin } from '../../testing/render-app';

/** What is drawn, without the ids that differ from mark to mark. */
function drawingOf(mark: Element): string {
  return mark.innerHTML.replace(/(id|clip-path)="[^"]*"/g, '');
}

describe('the specimen sheet of part marks', () => {
  it.each(['strand', 'rod', 'fibre'] as const)('tells every state of a %s apart at every size', (kind) => {
    const { container } = renderWithin(<PartMarkSpecimen kindOfWire={kind} />);
    for (const size of SPECIMEN_SIZES) {
      const marks = [...container.querySelectorAll(`svg[width="${size}"]`)];
      expect(marks).toHaveLength(PART_MARK_STATES.length);
      // The due and the overdue mark are one drawing: the word beside it says which.
      const apart = marks.filter((_, index) => PART_MARK_STATES[index].name !== 'overdue');
      expect(new Set(apart.map(drawingOf)).size).toBe(apart.length);
    }
    cleanup();
  });

  it('gives every state words of its own', () => {
    const { container } = renderWithin(<PartMarkSpecimen kindOfWire="strand" />);
    const words = [...container.querySelectorAll('svg[width="48"]')].map((mark) =>
      mark.getAttribute('aria-label'),
    );
    expect(new Set(words).size).toBe(PART_MARK_STATES.length);
  });

  it('draws the wires of a strand and the hatches of fibre only where there is room', () => {
    const { container } = renderWithin(<PartMarkSpecimen kindOfWire="strand" />);
    const circles = (size: number) =>
      container.querySelectorAll(`svg[width="${size}"] g[class*=wire] circle`).length;
    expect([circles(18), circles(24)]).toEqual([0, 0]);
    expect(circles(48)).toBeGreaterThan(0);
  });
});
