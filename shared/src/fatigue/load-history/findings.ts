import type { LogFinding, LogFindingCode } from './load-log.js';

/** Where something was met. */
export interface FindingPlace {
  column?: string;
  line?: number;
  ms?: number;
  untilMs?: number;
}

/** Collects what is met while reading: one entry for each code and column, with the first place and a count. */
export class Findings {
  private readonly entries = new Map<string, { code: LogFindingCode; count: number; place: FindingPlace }>();

  /** Notes that something was met, `count` times. */
  note(code: LogFindingCode, place: FindingPlace, count = 1): void {
    const key = `${code} ${place.column ?? ''}`;
    const entry = this.entries.get(key);
    if (entry === undefined) {
      this.entries.set(key, { code, count, place: { ...place, untilMs: place.untilMs ?? place.ms } });
      return;
    }
    entry.count += count;
    const until = place.untilMs ?? place.ms;
    if (until === undefined || Number.isNaN(until)) return;
    if (entry.place.untilMs === undefined || !(until < entry.place.untilMs)) entry.place.untilMs = until;
  }

  /** How often something was met. */
  count(code: LogFindingCode, column?: string): number {
    return this.entries.get(`${code} ${column ?? ''}`)?.count ?? 0;
  }

  /** The findings, each put into words by `describe`. */
  list(
    describe: (
      code: LogFindingCode,
      count: number,
      place: FindingPlace,
    ) => Pick<LogFinding, 'severity' | 'message' | 'action'>,
  ): LogFinding[] {
    return [...this.entries.values()].map(({ code, count, place }) => {
      const { severity, message, action } = describe(code, count, place);
      const finding: LogFinding = { code, severity, count, message, action };
      if (place.column !== undefined) finding.column = place.column;
      if (place.line !== undefined) finding.line = place.line;
      if (place.ms !== undefined && Number.isFinite(place.ms)) finding.fromMs = place.ms;
      if (place.untilMs !== undefined && Number.isFinite(place.untilMs)) finding.toMs = place.untilMs;
      return finding;
    });
  }
}
