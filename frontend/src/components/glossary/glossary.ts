/** Words a reader may not know, explained where they stand. One or two plain sentences each. */
export const GLOSSARY = {
  'allowance used':
    'The share of a part’s fatigue allowance its loads have used up so far, with the design fatigue factor already in it. At 100 % the part is due, long before it is expected to break.',
  'replace by':
    'The earliest date any rule gives: fatigue, the calendar rule of the material, or a limit somebody else sets. The rule that governs is named beside it.',
  'load basis':
    'Where the loads of a part come from: measured on it, mirrored from the same part on the other side, or measured on a part in line with it. Without a basis fatigue is not assessed.',
  'not assessed':
    'There is no load basis or no usable curve, so nothing is said about fatigue. Calendar and inspection rules still hold.',
  'calendar rule': 'The age at which parts of this material are replaced whatever their loads were.',
  'fatigue allowance':
    'How much loading and unloading a part may see by the design curve before it is replaced.',
  'planned sailing':
    'The hours under sail somebody expects in a year. They turn an allowance used into a date.',
  'breaking load':
    'The load at which the wire, rod or rope itself breaks when new. The assembly with its ends breaks earlier.',
  'load log': 'A recording of rig loads over time, as the logger on board wrote it.',
  detail:
    'A place on a part that can fail by itself: the wire in free length, a terminal, the turnbuckle thread, the pin. A part is as good as its worst detail.',
  'design curve':
    'A line through test results: how many cycles of a given range a detail stands, low enough that nearly all tested pieces lasted longer.',
  ledger:
    'The account of one fitted part. Entries are added and reversed, never changed or deleted, so each figure can be traced to its recording.',
} as const;

export type GlossaryWord = keyof typeof GLOSSARY;
