/** What stands around a stay, as far as it is known; null: not known. */
export interface Surroundings {
  pinDiameterMm: number | null;
  thread: string | null;
  toggleKn: number | null;
  chainplateHoleMm: number | null;
  chainplateKn: number | null;
  tangHoleMm: number | null;
  tangKn: number | null;
}

/** What a candidate brings along. */
export interface CandidateFittings {
  breakingLoadKn: number;
  pinDiameterMm: number | null;
  thread: string | null;
}

/** One thing that changes with the material. */
export interface KnockOn {
  item: 'pin' | 'thread' | 'toggle' | 'chainplate-hole' | 'chainplate' | 'mast-tang';
  words: string;
  /** True where something has to be measured before it can be told. */
  unknown: boolean;
}

/**
 * What else changes when a stay is made of something else: pin, thread, toggle, chainplate hole and mast tang. Fittings
 * weaker than the new stay become the weakest link; what is not known is asked for.
 */
export function knockOns(around: Surroundings, candidate: CandidateFittings): KnockOn[] {
  const list: KnockOn[] = [];
  const add = (item: KnockOn['item'], words: string, unknown = false): void => {
    list.push({ item, words, unknown });
  };
  const { pinDiameterMm, thread, breakingLoadKn } = candidate;
  if (pinDiameterMm === null) add('pin', 'The pin it takes is not known.', true);
  else {
    if (around.pinDiameterMm === null) add('pin', 'The diameter of the present pin is not known.', true);
    else if (around.pinDiameterMm !== pinDiameterMm) {
      add('pin', `Pins of ${pinDiameterMm} mm instead of ${around.pinDiameterMm} mm.`);
    }
    hole('chainplate-hole', 'chainplate', around.chainplateHoleMm, pinDiameterMm, add);
    hole('mast-tang', 'mast tang', around.tangHoleMm, pinDiameterMm, add);
  }
  if (thread === null) add('thread', 'The thread it takes is not known.', true);
  else if (around.thread === null) add('thread', 'The present thread is not known.', true);
  else if (around.thread !== thread)
    add('thread', `Thread ${thread} instead of ${around.thread}: a new screw.`);
  strength('toggle', 'toggle', around.toggleKn, breakingLoadKn, add);
  strength('chainplate', 'chainplate', around.chainplateKn, breakingLoadKn, add);
  strength('mast-tang', 'mast tang', around.tangKn, breakingLoadKn, add);
  return list;
}

type Add = (item: KnockOn['item'], words: string, unknown?: boolean) => void;

function hole(item: KnockOn['item'], name: string, holeMm: number | null, pinMm: number, add: Add): void {
  if (holeMm === null) add(item, `The hole of the ${name} is not known.`, true);
  else if (holeMm < pinMm)
    add(item, `The hole of the ${name} is ${holeMm} mm: too small for a pin of ${pinMm} mm.`);
  // A pin half a millimetre smaller than its hole is usual (common practice, no source).
  else if (holeMm > pinMm + 0.5)
    add(item, `The hole of the ${name} is ${holeMm} mm: a pin of ${pinMm} mm needs a bush.`);
}

function strength(item: KnockOn['item'], name: string, kn: number | null, stayKn: number, add: Add): void {
  if (kn === null) add(item, `The strength of the ${name} is not known.`, true);
  else if (kn < stayKn) {
    add(
      item,
      `The ${name} breaks at ${round(kn)} kN, before the stay at ${round(stayKn)} kN: it would be the weakest link.`,
    );
  }
}

function round(kn: number): string {
  return String(Number(kn.toPrecision(3)));
}
