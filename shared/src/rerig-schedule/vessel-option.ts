import type { VisitKind } from './plan-input.js';
import { costOfChoice, dutyOutcomes } from './read-plan.js';
import type { VesselChoice } from './read-plan.js';
import type { VesselModel } from './vessel-model.js';

/** One way to plan a vessel, reduced to what it costs and which room it takes. */
export interface VesselOption {
  choice: VesselChoice;
  costMinor: number;
  lateDays: number;
  uses: { windowId: string; kind: VisitKind; hours: number }[];
}

/** Adds up what a choice costs, how late it is, and the berth and hours it takes in each window. */
export function vesselOption(model: VesselModel, choice: VesselChoice): VesselOption {
  return {
    choice,
    costMinor: costOfChoice(model, choice),
    lateDays: dutyOutcomes(model, choice).reduce((sum, { lateDays }) => sum + lateDays, 0),
    uses: choice.visits.map(({ window, kind }) => {
      const open = model.windows[window];
      const ofVisit = open.offers.find((offer) => offer.kind === kind)!.hours;
      const ofWork = choice.works
        .filter((work) => work.window === window)
        .reduce(
          (sum, { taskIndex }) => sum + model.tasks[taskIndex].work.find((work) => work.kind === kind)!.hours,
          0,
        );
      return { windowId: open.window.id, kind, hours: ofVisit + ofWork };
    }),
  };
}
