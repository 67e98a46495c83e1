import { z } from 'zod';

/** UUIDv7 made by the application. */
export const idSchema = z.uuid();
/** An instant, ISO 8601 in UTC ("2026-07-01T10:15:30.000Z"). */
export const instantSchema = z.iso.datetime();
/** A calendar day, 'YYYY-MM-DD'; never a Date object. */
export const daySchema = z.iso.date();
/** Row version an update must carry; the server answers 409 when it moved on. */
export const versionSchema = z.int().min(1);
/** IANA time zone, checked against the runtime's own list. */
export const zoneSchema = z
  .string()
  .refine(isKnownZone, { message: 'Not a known time zone. Use a name such as Europe/Oslo.' });

function isKnownZone(zone: string): boolean {
  try {
    new Intl.DateTimeFormat('en', { timeZone: zone });
    return true;
  } catch {
    return false;
  }
}
