import { dutyOutcomes } from './read-plan.js';
import type { VesselChoice } from './read-plan.js';
import type { VesselModel } from './vessel-model.js';

/**
 * The same choice without work that nothing asks for and visits in which nothing is done. A solver that may stop within
 * a gap, or finds work that costs nothing, can leave some in. Latest first, so that the doings left are the needed ones.
 */
export function dropIdleWork(model: VesselModel, choice: VesselChoice): VesselChoice {
  const { pinned, locked } = model.input.decisions;
  let works = [...choice.works];
  const lateDaysOf = (candidate: VesselChoice['works']): number =>
    dutyOutcomes(model, { visits: choice.visits, works: candidate }).reduce(
      (sum, { lateDays }) => sum + lateDays,
      0,
    );
  let lateDays = lateDaysOf(works);
  for (const work of [...works].sort((one, other) => other.window - one.window)) {
    const { task } = model.tasks[work.taskIndex];
    const windowId = model.windows[work.window].window.id;
    const asked =
      pinned.some((pin) => pin.taskId === task.id && pin.windowId === windowId) ||
      works.some(
        (other) => other.window === work.window && model.tasks[other.taskIndex].task.needs.includes(task.id),
      );
    if (asked) continue;
    const without = works.filter((other) => other !== work);
    const lateWithout = lateDaysOf(without);
    if (lateWithout > lateDays) continue;
    works = without;
    lateDays = lateWithout;
  }
  return {
    visits: choice.visits.filter(
      ({ window }) =>
        works.some((work) => work.window === window) ||
        locked.some(({ windowId }) => windowId === model.windows[window].window.id),
    ),
    works,
  };
}
