import { dayNumber, dayOfNumber } from '@stayledger/shared/fatigue/life/days';
import { ICalCalendarMethod, default as ical } from 'ical-generator';
import type { RerigPlan } from './rerig-plan.entity.js';
import { visitKindWords } from './schedule-words.js';

/**
 * The visits of a plan and its order-by days as a calendar file. An event keeps its UID from plan to plan, so that a
 * calendar that reads the file again moves the event instead of adding one. Days are whole days without a zone.
 */
export function scheduleCalendar(vessel: { id: string; name: string }, row: RerigPlan | null): string {
  const calendar = ical({
    name: `Re-rig schedule of ${vessel.name}`,
    prodId: { company: 'Stayledger', product: 'Re-rig schedule', language: 'EN' },
    method: ICalCalendarMethod.PUBLISH,
  });
  const labels = new Map((row?.windowLabels ?? []).map(({ id, label }) => [id, label]));
  for (const visit of row?.plan.visits ?? []) {
    const label = labels.get(visit.windowId) ?? visit.windowId;
    const work = visit.tasks.map(
      ({ name, action }) => `${action === 'replace' ? 'Replace' : 'Inspect'}: ${name}`,
    );
    calendar.createEvent({
      id: `${vessel.id}-${visit.windowId}@stayledger`,
      stamp: row!.createdAt,
      start: wholeDay(visit.startOn),
      end: wholeDay(dayAfter(visit.doneByOn)),
      allDay: true,
      summary: `${vessel.name}: yard visit, ${visitKindWords(visit.kind)} (${label})`,
      description: [...work, 'Planned, not a booking until the yard confirms it.'].join('\n'),
    });
    for (const task of visit.tasks) {
      if (task.orderByOn === null) continue;
      calendar.createEvent({
        id: `${vessel.id}-order-${visit.windowId}-${task.partIds[0] ?? task.taskId}@stayledger`,
        stamp: row!.createdAt,
        start: wholeDay(task.orderByOn),
        end: wholeDay(dayAfter(task.orderByOn)),
        allDay: true,
        summary: `${vessel.name}: order by today for ${task.name} (${label})`,
      });
    }
  }
  return calendar.toString();
}

function dayAfter(day: string): string {
  return dayOfNumber(dayNumber(day) + 1);
}

function wholeDay(day: string): Date {
  return new Date(`${day}T00:00:00Z`);
}
