import { EntityManager } from '@mikro-orm/postgresql';
import { Injectable } from '@nestjs/common';
import type { PartLifeDto } from '@stayledger/shared/contracts/life';
import { wholeHistory } from '@stayledger/shared/fatigue/account/whole-history';
import { damageOfSpectrum, type SpectrumDamage } from '@stayledger/shared/fatigue/damage/damage-of-spectrum';
import { DAYS_PER_YEAR, dayNumber, dayOfNumber } from '@stayledger/shared/fatigue/life/days';
import type { LoadSpectrum } from '@stayledger/shared/fatigue/rainflow/load-spectrum';
import type { Principal } from '../auth/principal.js';
import { Clock } from '../common/clock/clock.js';
import type { LogOfPart } from '../ledger/part-history.js';
import { Position } from '../rig/position.entity.js';
import { VesselReach } from '../vessels/vessel-reach.service.js';
import { type AssessedDetail, assessedDetailsOf } from './detail-models.js';
import { assumptionsOf } from './life-assumptions.js';
import { headlineOf, plainHeadlineOf } from './life-words.js';
import { curvePointsOf, workingOf } from './life-working.js';
import { toPartStandingDto } from './part-standing.mapper.js';
import { PartStanding } from './part-standing.entity.js';
import { PartStandingService, type StandingBasis } from './part-standing.service.js';

const WORST_DAYS = 5;
const FORECAST_YEARS_MAX = 40;

/** The governing detail's history, evaluated. */
interface Governing {
  assessed: AssessedDetail;
  spectrum: LoadSpectrum;
  result: SpectrumDamage;
  dff: number;
}

/** Everything there is to say about the life of one fitted part, with the way each figure was come by. */
@Injectable()
export class LifeService {
  constructor(
    private readonly em: EntityManager,
    private readonly reach: VesselReach,
    private readonly standings: PartStandingService,
    private readonly clock: Clock,
  ) {}

  async ofPart(me: Principal, partId: string): Promise<PartLifeDto> {
    const { part, vessel } = await this.reach.partOrFail(me, partId, 'life:read');
    const row = await this.em.findOne(PartStanding, { fittedPart: part.id });
    const basis = await this.standings.basisOf(this.em, part.id, row?.computedOn);
    const position = await this.em.findOneOrFail(Position, part.position);
    const todayOn = this.clock.todayIn(vessel.zone);
    const standing = toPartStandingDto(row, todayOn);
    const assessed = await assessedDetailsOf(this.em, part.id);
    const governing = governingOf(basis, assessed);
    const words = {
      label: position.label,
      standing,
      todayOn,
      plannedHoursPerYear: basis.plan?.sailingHoursPerYear ?? null,
      calendarWords: basis.calendar?.words ?? null,
      wouldGiveDate: basis.standing.wouldGiveDate,
    };
    return {
      partId: part.id,
      asOfOn: basis.asOfOn,
      standing,
      headline: headlineOf(words),
      plainHeadline: plainHeadlineOf(words),
      wouldGiveDate: basis.standing.wouldGiveDate,
      details: detailsOf(basis, assessed),
      days: governing ? daysOf(governing, basis.logs) : [],
      worstDays: governing ? worstDaysOf(governing, basis.logs) : [],
      cycles: cyclesOf(governing),
      forecast: governing ? forecastOf(governing, basis) : [],
      assumptions: assumptionsOf(basis, governing?.assessed ?? null, governing?.result ?? null),
      working: governing ? this.working(governing, basis) : [],
      logs: basis.logs.map((log) => ({
        id: log.loadLogId,
        fileName: log.fileName,
        fromAt: new Date(log.fromMs).toISOString(),
        loggedHours: log.loggedHours,
      })),
    };
  }

  private working(governing: Governing, basis: StandingBasis): PartLifeDto['working'] {
    const { assessed, spectrum } = governing;
    return workingOf({
      assessed,
      spectrum,
      damage: basis.damages.get(assessed.detail.id) ?? 0,
      loggedHours: basis.loggedHours,
      plannedHoursPerYear: basis.plan?.sailingHoursPerYear ?? null,
      remainingYears: basis.standing.remainingYears,
      logNameOn: (day) => logOn(basis.logs, day)?.fileName ?? 'between logs',
      measureUnit: unitOf(assessed),
    });
  }
}

function governingOf(basis: StandingBasis, assessed: AssessedDetail[]): Governing | null {
  const found = assessed.find(({ detail }) => detail.key === basis.standing.governingDetailKey);
  if (!found || basis.logs.length === 0) return null;
  const spectrum = wholeHistory(basis.logs);
  return {
    assessed: found,
    spectrum,
    result: damageOfSpectrum(spectrum, found.model),
    dff: found.detail.designFatigueFactor,
  };
}

function detailsOf(basis: StandingBasis, assessed: AssessedDetail[]): PartLifeDto['details'] {
  return basis.details.map((detail) => {
    const curve = assessed.find((one) => one.detail.id === detail.id)?.curve;
    const standing = basis.standing.details.find(({ key }) => key === detail.key);
    const hasLogs = basis.logs.length > 0;
    return {
      detailId: detail.id,
      name: detail.name,
      curveId: curve?.id ?? null,
      curveVersion: curve?.version ?? null,
      curveName: curve?.name ?? null,
      measure: curve?.measure ?? null,
      damage: curve && hasLogs ? (basis.damages.get(detail.id) ?? 0) : null,
      designFatigueFactor: detail.designFatigueFactor,
      allowanceUsed: standing?.allowanceUsed ?? null,
      remainingYears: standing?.remainingYears ?? null,
      replaceByOn: standing?.replaceByOn ?? null,
      explanation: detail.explanation,
      estimates: detail.estimates,
    };
  });
}

/** The log a day belongs to; a cycle that closed between logs lies on the day of its crest, which is in one of them. */
function logOn(logs: readonly LogOfPart[], day: number): LogOfPart | undefined {
  const on = dayOfNumber(day);
  return logs.find((log) => log.fromOn <= on && on <= log.toOn);
}

function daysOf({ result, spectrum, dff }: Governing, logs: readonly LogOfPart[]): PartLifeDto['days'] {
  const highest = highestByDay(spectrum);
  return result.byDay.flatMap(({ day, damage }) => {
    const log = logOn(logs, day);
    if (!log) return [];
    return [
      {
        dayOn: dayOfNumber(day),
        allowance: damage * dff,
        maxKn: highest.get(day) ?? null,
        loadLogId: log.loadLogId,
      },
    ];
  });
}

function highestByDay({ days, residue, residueDay, step }: LoadSpectrum): Map<number, number> {
  const toKn = step > 0 ? step : 1;
  const highest = new Map<number, number>();
  const see = (day: number, level: number) =>
    highest.set(day, Math.max(highest.get(day) ?? -Infinity, decimal(level * toKn)));
  for (const { day, cycles } of days) for (const level of cycles.high) see(day, level);
  residue.forEach((level, i) => see(residueDay[i], level));
  return highest;
}

/** Level times step without the last digits' dust (20.900000000000002); a load has never so many figures. */
function decimal(loadKn: number): number {
  return Number(loadKn.toPrecision(12));
}

function worstDaysOf({ result, dff }: Governing, logs: readonly LogOfPart[]): PartLifeDto['worstDays'] {
  return [...result.byDay]
    .filter(({ damage }) => damage > 0)
    .sort((a, b) => b.damage - a.damage || a.day - b.day)
    .flatMap(({ day, damage }) => {
      const log = logOn(logs, day);
      if (!log) return [];
      return [
        {
          dayOn: dayOfNumber(day),
          allowance: damage * dff,
          shareOfTotal: damage / result.damage,
          loadLogId: log.loadLogId,
          loadLogName: log.fileName,
        },
      ];
    })
    .slice(0, WORST_DAYS);
}

function cyclesOf(governing: Governing | null): PartLifeDto['cycles'] {
  if (!governing) return { measureUnit: 'MPa', bins: [], curvePoints: [] };
  const { assessed, result } = governing;
  const smallest = result.histogram.at(0)?.range ?? 0;
  return {
    measureUnit: unitOf(assessed),
    bins: result.histogram.map(({ low, high, count, damage }) => ({
      rangeLow: low,
      rangeHigh: high,
      cycles: count,
      damageShare: result.damage > 0 ? damage / result.damage : 0,
    })),
    curvePoints: curvePointsOf(assessed, smallest, 2 * result.largestRange),
  };
}

function unitOf({ curve }: AssessedDetail): string {
  return curve.measure === 'load-ratio' ? 'of breaking load' : 'MPa';
}

/** Allowance at planned sailing, year by year, until it is used up or nobody would plan that far. */
function forecastOf({ assessed, dff }: Governing, basis: StandingBasis): PartLifeDto['forecast'] {
  const { plan, loggedHours, asOfOn, standing } = basis;
  if (plan === null || standing.fatigueReplaceByOn === null || loggedHours === 0) return [];
  const damage = basis.damages.get(assessed.detail.id) ?? 0;
  const perYear = (damage / loggedHours) * plan.sailingHoursPerYear * dff;
  const today = dayNumber(asOfOn);
  const points = [{ on: asOfOn, allowance: damage * dff }];
  for (let year = 1; year <= FORECAST_YEARS_MAX; year++) {
    const on = dayOfNumber(today + Math.round(year * DAYS_PER_YEAR));
    if (on >= standing.fatigueReplaceByOn) {
      points.push({ on: standing.fatigueReplaceByOn, allowance: Math.max(1, damage * dff) });
      break;
    }
    points.push({ on, allowance: damage * dff + year * perYear });
  }
  return points;
}
