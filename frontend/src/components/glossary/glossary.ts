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
  provisional:
    'The date hangs on an estimate nobody has confirmed, such as a fitting day or a breaking load taken from a table.',
  position:
    'A place on the rig, such as the cap shroud on the port side. Parts come and go; the place stays.',
  'design fatigue factor':
    'Divides the life a curve gives by 3, 5 or 10: the more that hangs on a part and the harder it is to inspect, the larger.',
  slope:
    'How steeply life falls with the range of the load: with a slope of 5, twice the range leaves one part in thirty-two of the cycles.',
  scatter:
    'How far apart the lives of equal pieces lay in the tests, as a standard deviation of the logarithm of the cycles.',
  level:
    'Where a curve runs among its test results: through the middle of them, or lower, so that most pieces lasted longer.',
  'cut-off': 'A range below which a curve counts no damage. Where it has none, small ranges count too.',
  'mean load':
    'The steady pull a cycle swings about. Some curves already contain it, and then it is not counted twice.',
} as const;

export type GlossaryWord = keyof typeof GLOSSARY;
