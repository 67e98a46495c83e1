import type { LogTimeFormat } from './load-log.js';
import { isReadableInstant } from './readable-instant.js';

const ISO =
  /^([+-]?\d{4})([-/])(\d{2})\2(\d{2})[T ](\d{2}):(\d{2})(?::(\d{2})(?:[.,](\d+))?)?\s*(Z|z|UTC|[+-]\d{2}(?::?\d{2})?)?$/;

/** An instant, and whether the cell itself said how far its clock is from UTC. */
export interface ParsedTime {
  ms: number;
  hasOffset: boolean;
}

/**
 * The instant in a cell, the slow and general way.
 *
 * @param text the cell, quotes removed: ISO 8601 (date and time with `T` or a blank, seconds and fraction
 *   optional, `Z`, an offset or neither), or seconds or milliseconds since 1970
 * @param format how it is written
 * @returns epoch milliseconds, an ISO time without offset read as UTC; `null` when it is no such time, or one that no
 *   recorder can have written (`isReadableInstant`)
 */
export function parseTimeText(text: string, format: LogTimeFormat): ParsedTime | null {
  const trimmed = text.trim();
  if (format !== 'iso') {
    const dotted = trimmed.replace(',', '.');
    if (!/^-?\d+(?:\.\d*)?(?:[eE]\+?\d+)?$/.test(dotted)) return null;
    const ms = Number(dotted) * (format === 'epoch-s' ? 1000 : 1);
    return isReadableInstant(ms) ? { ms, hasOffset: true } : null;
  }
  const parts = ISO.exec(trimmed);
  if (parts === null) return null;
  const [, year, , month, day, hour, minute, second = '0', fraction = '', offset] = parts;
  const dateMs = dateToMs(Number(year), Number(month), Number(day));
  // 24:00 is the end of a day, and a leap second is read as the second after it.
  if (dateMs === null || !isReadableInstant(dateMs)) return null;
  if (Number(hour) > 24 || Number(minute) > 59 || Number(second) > 60) return null;
  if (Number(hour) === 24 && (Number(minute) > 0 || Number(second) > 0)) return null;
  const wholeSeconds = (Number(hour) * 60 + Number(minute)) * 60 + Number(second);
  let ms = dateMs + wholeSeconds * 1000;
  if (fraction !== '') ms += (Number(fraction) * 1000) / 10 ** fraction.length;
  if (offset === undefined) return { ms, hasOffset: false };
  if (/^[+-]/.test(offset)) {
    const digits = offset.slice(1).replace(':', '').padEnd(4, '0');
    const minutes = Number(digits.slice(0, 2)) * 60 + Number(digits.slice(2));
    ms -= (offset[0] === '-' ? -minutes : minutes) * 60_000;
  }
  return { ms, hasOffset: true };
}

/** Midnight UTC of a calendar date that exists, epoch milliseconds; `null` for one that does not. */
export function dateToMs(year: number, month: number, day: number): number | null {
  if (month < 1 || month > 12 || day < 1) return null;
  const leap = (year % 4 === 0 && year % 100 !== 0) || year % 400 === 0;
  const lengths = [31, leap ? 29 : 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31];
  if (day > lengths[month - 1]) return null;
  // Days since 1970 by counting years from March, so that the leap day is the last of its year.
  const y = month <= 2 ? year - 1 : year;
  const era = Math.floor(y / 400);
  const yearOfEra = y - era * 400;
  const dayOfYear = Math.floor((153 * (month > 2 ? month - 3 : month + 9) + 2) / 5) + day - 1;
  const dayOfEra = yearOfEra * 365 + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100) + dayOfYear;
  return (era * 146_097 + dayOfEra - 719_468) * 86_400_000;
}
