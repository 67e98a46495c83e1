import { preferencesSchema, type SessionDto } from '@stayledger/shared/contracts/auth';
import type { PartStandingDto, PositionDto } from '@stayledger/shared/contracts/rig';
import type { FleetRowDto, VesselDto } from '@stayledger/shared/contracts/vessels';
import { ROLE_PERMISSIONS, type Role } from '@stayledger/shared/permissions/permissions';

/** A well-formed id that ends in the number; the same number gives the same id. */
export function sampleId(number: number): string {
  return `0193f1d2-7c00-7000-8000-${String(number).padStart(12, '0')}`;
}

export function sampleSession(...roles: Role[]): SessionDto {
  return {
    signedIn: true,
    user: {
      id: sampleId(1),
      name: 'Ailsa Renwick',
      email: 'ailsa@example.org',
      preferences: preferencesSchema.parse({}),
      version: 1,
    },
    roles: roles.map((role) => ({ role, firmId: sampleId(2), firmName: 'Skerry Rigging' })),
    permissions: [...new Set(roles.flatMap((role) => ROLE_PERMISSIONS[role]))],
  };
}

export const signedOut: SessionDto = { signedIn: false, user: null, roles: [], permissions: [] };

export function sampleStanding(overrides: Partial<PartStandingDto> = {}): PartStandingDto {
  return {
    assessment: 'assessed',
    notAssessedReason: null,
    loadBasis: 'measured',
    allowanceUsed: 0.67,
    governingDetail: 'Lower terminal',
    loggedHours: 412,
    fatigueReplaceByOn: '2029-04-02',
    calendarReplaceByOn: '2031-05-01',
    replaceByOn: '2029-04-02',
    governingRule: 'fatigue',
    remainingYears: 2.3,
    due: 'in-date',
    ...overrides,
  };
}

export function sampleVessel(overrides: Partial<VesselDto> = {}): VesselDto {
  return {
    id: sampleId(10),
    name: 'Brightwater',
    rigType: 'cutter',
    zone: 'Europe/Oslo',
    buildYear: 2004,
    lengthM: 14.2,
    homePort: 'Skarvik',
    useKind: 'charter',
    notes: '',
    firmId: sampleId(2),
    firmName: 'Skerry Rigging',
    permissions: [...ROLE_PERMISSIONS.rigger],
    createdAt: '2026-03-01T08:00:00.000Z',
    version: 1,
    ...overrides,
  };
}

export function sampleFleetRow(overrides: Partial<FleetRowDto> = {}): FleetRowDto {
  return {
    id: sampleId(10),
    name: 'Brightwater',
    rigType: 'cutter',
    homePort: 'Skarvik',
    useKind: 'charter',
    zone: 'Europe/Oslo',
    governing: {
      partId: sampleId(30),
      positionLabel: 'Cap shroud, port',
      kindOfWire: 'strand',
      assessment: 'assessed',
      replaceByOn: '2029-04-02',
      rule: 'fatigue',
      allowanceUsed: 0.67,
      due: 'in-date',
    },
    counts: { parts: 9, overdue: 0, due: 0, assessed: 4, notAssessed: 5, calendarOnly: 0, logsWaiting: 0 },
    loggedHours: 412,
    lastLogAt: '2026-09-14T16:20:00.000Z',
    ...overrides,
  };
}

export function samplePosition(overrides: Partial<PositionDto> = {}): PositionDto {
  return {
    id: sampleId(20),
    vesselId: sampleId(10),
    kind: 'cap-shroud',
    side: 'port',
    label: 'Cap shroud, port',
    mast: 'main',
    alias: 'V1',
    version: 1,
    part: {
      id: sampleId(30),
      constructionName: '1x19 stainless strand',
      kindOfWire: 'strand',
      diameterMm: 10,
      breakingLoadKn: 71.2,
      fittedOn: '2019-05-02',
      standing: sampleStanding(),
    },
    ...overrides,
  };
}
