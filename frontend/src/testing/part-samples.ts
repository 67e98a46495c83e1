import type { PartLifeDto } from '@stayledger/shared/contracts/life';
import type { LedgerEntryDto } from '@stayledger/shared/contracts/ledger';
import type { FittedPartDto } from '@stayledger/shared/contracts/parts';
import { sampleId, sampleStanding } from './samples';

export function samplePart(overrides: Partial<FittedPartDto> = {}): FittedPartDto {
  return {
    id: sampleId(30),
    vesselId: sampleId(10),
    positionId: sampleId(20),
    positionLabel: 'Cap shroud, port',
    positionAlias: 'V1',
    constructionId: 'strand-1x19-316',
    constructionVersion: 1,
    constructionName: '1x19 stainless strand',
    kindOfWire: 'strand',
    diameterMm: 10,
    breakingLoadKn: 71.2,
    breakingLoadFromCertificate: false,
    breakingLoadSource: 'table-lower-grade',
    metallicAreaMm2: 59.7,
    lengthM: 15.2,
    upperTerminal: 'swaged',
    lowerTerminal: 'swaged',
    threadSize: null,
    pinDiameterMm: null,
    hardware: null,
    batch: '',
    certificate: '',
    fittedOn: '2019-05-02',
    notes: '',
    assembly: { breakingLoadKn: 64, weakestElement: 'upper terminal', unknownElements: ['chainplate'] },
    removedOn: null,
    removedReason: null,
    standing: sampleStanding(),
    details: [],
    createdAt: '2026-03-01T08:00:00.000Z',
    version: 1,
    ...overrides,
  };
}

export function sampleLife(overrides: Partial<PartLifeDto> = {}): PartLifeDto {
  return {
    partId: sampleId(30),
    asOfOn: '2026-12-01',
    standing: sampleStanding(),
    headline: 'Cap shroud, port: two thirds of its fatigue allowance is used.',
    plainHeadline: 'The port cap shroud should be replaced by spring 2029.',
    wouldGiveDate: [],
    details: [
      {
        detailId: sampleId(50),
        name: 'Wire in free length',
        curveId: 'en-1993-1-11-150',
        curveVersion: 1,
        curveName: 'Tension rod and rope, category 150',
        measure: 'stress-metallic',
        damage: 0.05,
        designFatigueFactor: 3,
        allowanceUsed: 0.15,
        remainingYears: 14,
        replaceByOn: '2040-06-01',
        explanation: 'Stress range on the metallic area.',
        estimates: [],
      },
      {
        detailId: sampleId(51),
        name: 'Lower terminal',
        curveId: 'terminal-112',
        curveVersion: 1,
        curveName: 'Swaged terminal, category 112',
        measure: 'stress-metallic',
        damage: 0.134,
        designFatigueFactor: 5,
        allowanceUsed: 0.67,
        remainingYears: 2.3,
        replaceByOn: '2029-04-02',
        explanation: 'Stress range on the metallic area.',
        estimates: ['Category borrowed from a wire of another make.'],
      },
      {
        detailId: sampleId(52),
        name: 'Chainplate',
        curveId: null,
        curveVersion: null,
        curveName: null,
        measure: null,
        damage: null,
        designFatigueFactor: 10,
        allowanceUsed: null,
        remainingYears: null,
        replaceByOn: null,
        explanation: 'Its section is not known.',
        estimates: [],
      },
    ],
    days: [
      { dayOn: '2026-06-14', allowance: 0.2, maxKn: 21.5, loadLogId: sampleId(40) },
      { dayOn: '2026-06-15', allowance: 0.4, maxKn: 31, loadLogId: sampleId(40) },
    ],
    worstDays: [
      {
        dayOn: '2026-06-15',
        allowance: 0.4,
        shareOfTotal: 0.6,
        loadLogId: sampleId(40),
        loadLogName: 'june-passage.csv',
      },
    ],
    cycles: {
      measureUnit: 'MPa',
      bins: [{ rangeLow: 40, rangeHigh: 60, cycles: 1200, damageShare: 1 }],
      curvePoints: [
        { range: 150, cyclesToFailure: 2e6 },
        { range: 15, cyclesToFailure: 2e10 },
      ],
    },
    forecast: [
      { on: '2026-12-01', allowance: 0.67 },
      { on: '2029-04-02', allowance: 1 },
    ],
    assumptions: ['One season of recordings stands for all to come.'],
    working: [
      {
        title: 'Stress range of the most damaging cycle',
        equation: 'Δσ = 1000 · ΔF / A_m',
        inputs: [
          { symbol: 'ΔF', meaning: 'load range', value: 5.97, unit: 'kN', from: 'the log' },
          { symbol: 'A_m', meaning: 'metallic area', value: 59.7, unit: 'mm²', from: 'the construction' },
        ],
        result: { symbol: 'Δσ', value: 100, unit: 'MPa' },
        source: 'EN 1993-1-11, 9.1',
      },
      {
        title: 'Allowance used',
        equation: 'U = D · DFF',
        inputs: [
          { symbol: 'D', meaning: 'damage', value: 0.134, unit: '', from: 'the ledger' },
          { symbol: 'DFF', meaning: 'design fatigue factor', value: 5, unit: '', from: 'the detail' },
        ],
        result: { symbol: 'U', value: 0.7, unit: '' },
        source: 'rule of the product',
      },
    ],
    logs: [
      {
        id: sampleId(40),
        fileName: 'june-passage.csv',
        fromAt: '2026-06-14T08:00:00.000Z',
        loggedHours: 412,
      },
    ],
    ...overrides,
  };
}

export function sampleEntry(overrides: Partial<LedgerEntryDto> = {}): LedgerEntryDto {
  return {
    id: sampleId(60),
    detailId: sampleId(51),
    detailName: 'Lower terminal',
    sequence: 1,
    kind: 'recorded',
    damage: 0.1,
    allowance: 0.5,
    loadLogId: sampleId(40),
    loadLogName: 'june-passage.csv',
    reversesId: null,
    curveId: 'terminal-112',
    curveVersion: 1,
    engineVersion: '1.0.0',
    postedByName: 'Ailsa Renwick',
    postedAt: '2026-06-16T09:30:00.000Z',
    hash: 'c0ffee00'.repeat(8),
    reason: null,
    ...overrides,
  };
}
