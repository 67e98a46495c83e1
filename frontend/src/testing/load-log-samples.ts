import type { LoadLogDto, LogReviewDto } from '@stayledger/shared/contracts/load-logs';
import { sampleId } from './samples';

/** A counted log of three hours for the specs of these screens; each spec overrides what it is about. */
export function sampleLog(overrides: Partial<LoadLogDto> = {}): LoadLogDto {
  return {
    id: sampleId(40),
    vesselId: sampleId(10),
    vesselName: 'Brightwater',
    state: 'counted',
    fileName: 'june-passage.csv',
    sizeBytes: 1_000_000,
    receivedBytes: 1_000_000,
    sha256: 'a'.repeat(64),
    mapping: {
      delimiter: ',',
      decimalComma: false,
      time: { column: 'time', format: 'iso', naiveOffsetMinutes: 0 },
      channels: [{ column: 'cap_port', unit: 'kN', positionId: sampleId(20) }],
    },
    rows: 10_800,
    fromAt: '2026-06-14T08:00:00.000Z',
    toAt: '2026-06-14T11:00:00.000Z',
    loggedHours: 3,
    sampleRateHz: 1,
    findings: [],
    failure: null,
    sameFileAs: null,
    uploadedByName: 'Ailsa Renwick',
    decidedByName: null,
    decidedAt: null,
    decisionReason: null,
    job: null,
    createdAt: '2026-06-15T07:00:00.000Z',
    version: 3,
    ...overrides,
  };
}

export function sampleReview(log: LoadLogDto, overrides: Partial<LogReviewDto> = {}): LogReviewDto {
  const start = Date.parse('2026-06-14T08:00:00.000Z');
  return {
    log,
    traces: [
      {
        column: 'cap_port',
        positionId: sampleId(20),
        positionLabel: 'Cap shroud, port',
        samples: 10_800,
        missing: 0,
        closedCycles: 512,
        minKn: 0.4,
        maxKn: 21.5,
        maxAt: '2026-06-14T09:00:00.000Z',
        atMs: [start, start + 3_600_000, start + 7_200_000],
        lowKn: [0.4, 3, 2],
        highKn: [9, 21.5, 12],
      },
    ],
    parts: [
      {
        partId: sampleId(30),
        positionLabel: 'Cap shroud, port',
        before: 0.12,
        after: 0.15,
        details: [
          {
            detailId: sampleId(50),
            name: 'Upper terminal',
            before: 0.12,
            after: 0.15,
            recorded: 0.02,
            betweenLogs: 0.01,
          },
        ],
        note: null,
      },
    ],
    postDisabledReason: null,
    ...overrides,
  };
}
