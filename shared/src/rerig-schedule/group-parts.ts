import { VISIT_KINDS } from './plan-input.js';
import type { PlanTask, TaskGround, VisitKind, WorkTerms } from './plan-input.js';

/** Work on one part, before parts that are alike are put together. */
export interface PartWork {
  /** Days from doing it until it is due again; null: never again. */
  againAfterDays: number | null;
  terms: Partial<Record<VisitKind, WorkTerms>>;
  leadDays: number;
}

/** A fitted part as the planner needs it. */
export interface PlanPart {
  id: string;
  /** "cap shroud, port". */
  name: string;
  /** What the parts of a group are called together: "cap shrouds". */
  groupName: string;
  /**
   * 'dated': the replace-by date stands. 'provisional': it hangs on an estimate nobody has confirmed. 'suspended': an
   * incident has put it aside. The last two are planned as inspections, never as replacements.
   */
  standing: 'dated' | 'provisional' | 'suspended';
  /** Null where the part has no date. */
  replaceByOn: string | null;
  /** "Inspect or confirm by", for provisional and suspended parts. */
  confirmByOn: string | null;
  replacement: PartWork;
  /** Inspection by interval, or to confirm a date; null where none is asked for. */
  inspection: (PartWork & { dueOn: string | null }) | null;
}

/** Rules of the trade, the builder or the firm on what is done together. */
export interface TogetherRules {
  /** Parts always replaced in the same visit, such as port with starboard. */
  together: readonly (readonly string[])[];
  /** A part whose replacement takes others along, which may also be replaced alone: wire takes its terminals. */
  takesAlong: readonly { partId: string; alongIds: readonly string[] }[];
}

/** Tasks, and what kept parts from being planned as wished. */
export interface GroupedParts {
  tasks: PlanTask[];
  /** One sentence each; empty where all is well. */
  problems: string[];
}

interface Draft {
  parts: PlanPart[];
  action: 'replace' | 'inspect';
  ground: TaskGround;
  dueOn: string | null;
  work: PartWork;
}

/**
 * Parts as tasks. Parts bound together become one task: the earliest date, the shortest life, the longest lead time and
 * the kinds of visit that allow all of them, cost and hours added up. So do parts that agree in date, life, kinds and lead
 * time: with room enough in a visit, planning them apart cannot be cheaper, for all may follow whichever of them is
 * planned best.
 *
 * A replaced part counts as inspected. A provisional or suspended part is inspected, not replaced.
 */
export function groupParts(parts: readonly PlanPart[], rules: TogetherRules): GroupedParts {
  const bound = boundSets(parts, rules.together);
  const drafts: Draft[] = [];
  const problems: string[] = [];
  for (const set of bound) {
    const replaced = set.filter(({ standing }) => standing === 'dated');
    if (replaced.length > 0) drafts.push(replacementOf(replaced));
    for (const part of set) {
      const inspection = inspectionOf(part);
      if (inspection !== null) drafts.push(inspection);
      else if (part.standing !== 'dated') {
        problems.push(
          `${part.name}: its date is ${part.standing}, and no inspection is priced that would settle it.`,
        );
      }
    }
  }
  const tasks = alike(drafts).map((draft): PlanTask => taskOf(draft));
  for (const task of tasks) {
    if (Object.keys(task.terms).length === 0 && task.dueOn !== null) {
      problems.push(`${task.name}: no kind of visit allows all of what has to be done together.`);
    }
  }
  return { tasks: tasks.map((task) => ({ ...task, ...relationsOf(task, tasks, rules) })), problems };
}

/** Sets of parts bound by the rules, directly or through a third one; single parts by themselves. */
function boundSets(parts: readonly PlanPart[], together: TogetherRules['together']): PlanPart[][] {
  const leader = new Map(parts.map(({ id }) => [id, id]));
  const leaderOf = (id: string): string => {
    const up = leader.get(id)!;
    return up === id ? id : leaderOf(up);
  };
  for (const ids of together) {
    const known = ids.filter((id) => leader.has(id));
    for (const id of known.slice(1)) leader.set(leaderOf(id), leaderOf(known[0]));
  }
  const sets = new Map<string, PlanPart[]>();
  for (const part of parts) {
    const key = leaderOf(part.id);
    sets.set(key, [...(sets.get(key) ?? []), part]);
  }
  return [...sets.values()];
}

function replacementOf(parts: PlanPart[]): Draft {
  const dates = parts.flatMap(({ replaceByOn }) => (replaceByOn === null ? [] : [replaceByOn]));
  return {
    parts,
    action: 'replace',
    ground: 'replace-by',
    dueOn: dates.length === 0 ? null : dates.reduce((least, day) => (day < least ? day : least)),
    work: joined(parts.map(({ replacement }) => replacement)),
  };
}

function inspectionOf(part: PlanPart): Draft | null {
  const { standing, inspection } = part;
  if (inspection === null) return null;
  const dueOn =
    standing === 'dated' || part.confirmByOn === null || (inspection.dueOn ?? '9999') < part.confirmByOn
      ? inspection.dueOn
      : part.confirmByOn;
  const ground = standing === 'dated' ? 'inspection-interval' : (`${standing}-date` as const);
  return { parts: [part], action: 'inspect', ground, dueOn, work: inspection };
}

/** Work done as one: every kind of visit that allows all of it, sums of cost and hours. */
function joined(works: readonly PartWork[]): PartWork {
  const kinds = VISIT_KINDS.filter((kind) => works.every(({ terms }) => terms[kind] !== undefined));
  const lives = works.flatMap(({ againAfterDays }) => (againAfterDays === null ? [] : [againAfterDays]));
  return {
    againAfterDays: lives.length === 0 ? null : Math.min(...lives),
    leadDays: Math.max(...works.map(({ leadDays }) => leadDays)),
    terms: Object.fromEntries(
      kinds.map((kind) => [
        kind,
        {
          costMinor: works.reduce((sum, { terms }) => sum + terms[kind]!.costMinor, 0),
          hours: works.reduce((sum, { terms }) => sum + terms[kind]!.hours, 0),
        },
      ]),
    ),
  };
}

function alike(drafts: readonly Draft[]): Draft[] {
  const groups = new Map<string, Draft>();
  for (const draft of drafts) {
    const { action, ground, dueOn, work } = draft;
    const kinds = VISIT_KINDS.filter((kind) => work.terms[kind] !== undefined);
    const key = JSON.stringify([
      draft.parts[0].groupName,
      action,
      ground,
      dueOn,
      work.againAfterDays,
      work.leadDays,
      kinds,
    ]);
    const known = groups.get(key);
    groups.set(
      key,
      known === undefined
        ? draft
        : { ...known, parts: [...known.parts, ...draft.parts], work: joined([known.work, work]) },
    );
  }
  return [...groups.values()];
}

function taskOf({ parts, action, ground, dueOn, work }: Draft): PlanTask {
  const names = [...new Set(parts.map(({ groupName }) => groupName))];
  return {
    id: `${action}:${parts
      .map(({ id }) => id)
      .sort()
      .join('+')}`,
    name: parts.length === 1 ? parts[0].name : names.join(', '),
    partIds: parts.map(({ id }) => id),
    action,
    ground,
    dueOn,
    againAfterDays: work.againAfterDays,
    terms: work.terms,
    leadDays: work.leadDays,
    alsoDoneBy: [],
    needs: [],
  };
}

function relationsOf(
  task: PlanTask,
  tasks: readonly PlanTask[],
  rules: TogetherRules,
): Pick<PlanTask, 'alsoDoneBy' | 'needs'> {
  const replacements = tasks.filter(({ action }) => action === 'replace');
  if (task.action === 'inspect') {
    // Only a task that renews all of what would be inspected counts as the inspection.
    const renewing = replacements.filter(({ partIds }) => task.partIds.every((id) => partIds.includes(id)));
    return { alsoDoneBy: renewing.map(({ id }) => id), needs: [] };
  }
  const along = rules.takesAlong
    .filter(({ partId }) => task.partIds.includes(partId))
    .flatMap(({ alongIds }) => alongIds);
  const needed = replacements.filter(
    (other) => other.id !== task.id && other.partIds.some((id) => along.includes(id)),
  );
  return { alsoDoneBy: [], needs: needed.map(({ id }) => id) };
}
