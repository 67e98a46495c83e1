import { Clock } from '../common/clock/clock.js';

/** A clock that stands still until a test moves it. Starts at a summer noon. */
export class TestClock extends Clock {
  private current = Date.parse('2027-07-01T12:00:00.000Z');

  override now(): Date {
    return new Date(this.current);
  }

  setTo(instant: string): void {
    this.current = Date.parse(instant);
  }

  advance(step: { days?: number; hours?: number; minutes?: number; seconds?: number }): void {
    const { days = 0, hours = 0, minutes = 0, seconds = 0 } = step;
    this.current += (((days * 24 + hours) * 60 + minutes) * 60 + seconds) * 1000;
  }
}
