import type { DrawnRigDto, PositionDto } from '@stayledger/shared/contracts/rig';
import type { VesselDto } from '@stayledger/shared/contracts/vessels';
import { suggestGeometry } from '@stayledger/shared/rig/templates/suggest-geometry';
import { suggestPositionGeometry } from '@stayledger/shared/rig/templates/suggest-position-geometry';
import { templateForRigType } from '@stayledger/shared/rig/templates/template-keys';
import { screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { renderWithin } from '../../testing/render-app';
import { sampleId, samplePosition, sampleStanding, sampleVessel } from '../../testing/samples';
import { drawnRig } from './drawn-rig';
import { RigElevation } from './rig-elevation';

const place = (number: number, change: Partial<PositionDto>): PositionDto =>
  samplePosition({ id: sampleId(number), ...change });

const positions = [
  place(20, { kind: 'forestay', side: 'centre', label: 'Forestay', alias: null }),
  place(21, { kind: 'cap-shroud', side: 'port', label: 'Cap shroud, port' }),
  place(22, { kind: 'backstay', side: 'centre', label: 'Backstay', alias: null, part: null }),
  place(23, { kind: 'halyard', side: 'centre', label: 'Halyard', alias: null, part: null }),
];

/** The reply for a vessel nobody has measured. */
function usual({ rigType, lengthM }: VesselDto, items: PositionDto[]): DrawnRigDto {
  const geometry = suggestGeometry(templateForRigType(rigType), { lengthM });
  return {
    source: 'suggested',
    version: null,
    geometry,
    positions: items.map((position) => ({
      positionId: position.id,
      source: 'suggested',
      geometry: suggestPositionGeometry(position, geometry),
      lengthM: null,
    })),
  };
}

function show(items = positions) {
  const vessel = sampleVessel();
  return renderWithin(
    <RigElevation
      name={vessel.name}
      rig={drawnRig(usual(vessel, items), items)}
      todayOn="2026-12-01"
      zone="Europe/Oslo"
    />,
  );
}

describe('the drawing of a rig', () => {
  it('offers its parts in rig order, each with its state in words, and says what it leaves out', () => {
    show();
    const list = screen.getByRole('listbox', { name: /^Parts of Brightwater/ });
    expect(
      within(list)
        .getAllByRole('option')
        .map((option) => option.getAttribute('aria-label')),
    ).toEqual([
      expect.stringMatching(/^Forestay: In date, 67/),
      expect.stringMatching(/^Cap shroud, port: In date, 67/),
      'Backstay: no part fitted',
    ]);
    expect(screen.getByText(/Not drawn: halyard\./)).toBeTruthy();
    expect(screen.getByText(/Nobody has measured this rig yet/)).toBeTruthy();
  });

  it('is one stop for the keyboard: arrows, Home and End choose, Enter opens the part', async () => {
    const { user, router } = show();
    const chosen = () => screen.getByRole('option', { selected: true }).getAttribute('aria-label');
    await user.tab();
    expect(document.activeElement).toBe(screen.getByRole('listbox'));
    expect(chosen()).toMatch(/^Forestay/);
    await user.keyboard('{End}');
    expect(chosen()).toMatch(/^Backstay/);
    await user.keyboard('{ArrowDown}');
    expect(chosen()).toMatch(/^Backstay/);
    await user.keyboard('{Enter}');
    expect(router.state.location.pathname).toBe('/');
    await user.keyboard('{ArrowUp}');
    expect(chosen()).toMatch(/^Cap shroud/);
    expect(screen.getByRole('listbox').getAttribute('aria-activedescendant')).toBe(
      screen.getByRole('option', { selected: true }).id,
    );
    await user.keyboard('{Enter}');
    expect(router.state.location.pathname).toBe(`/parts/${sampleId(30)}`);
  });

  it('is picked from with the pointer as well, and shows what was picked', async () => {
    const overdue = place(24, {
      kind: 'bobstay',
      label: 'Bobstay',
      side: 'centre',
      part: {
        ...(samplePosition().part as NonNullable<PositionDto['part']>),
        standing: sampleStanding({ due: 'overdue', replaceByOn: '2024-05-03' }),
      },
    });
    const vessel = sampleVessel({ rigType: 'cutter' });
    const { user } = renderWithin(
      <RigElevation
        name={vessel.name}
        rig={drawnRig(usual(vessel, [...positions, overdue]), [...positions, overdue])}
        todayOn="2026-12-01"
        zone="Europe/Oslo"
      />,
    );
    const options = screen.getAllByRole('option');
    await user.click(options[options.length - 1]);
    expect(screen.getByRole('option', { selected: true })).toBe(options[options.length - 1]);
    expect(screen.getByRole('link', { name: 'Open the part' })).toBeTruthy();
    expect(screen.getByText('Overdue')).toBeTruthy();
  });

  it('draws a heavier wire with a heavier line', () => {
    const thick = place(25, {
      kind: 'lower',
      label: 'Lower shroud, port',
      part: { ...(samplePosition().part as NonNullable<PositionDto['part']>), diameterMm: 24 },
    });
    show([positions[1], thick]);
    const [thin, heavy] = screen
      .getAllByRole('option')
      .map((option) => Number(option.querySelector('[class*=wire]')?.getAttribute('stroke-width')));
    // 10 mm and 24 mm: 2.4 times as heavy.
    expect(heavy / thin).toBeCloseTo(2.4, 9);
  });
});
