import type { FittedPartDto, TERMINALS } from '@stayledger/shared/contracts/parts';

type Terminal = (typeof TERMINALS)[number];

export const KIND_OF_WIRE_WORDS = { strand: 'Strand and rope', rod: 'Rod', fibre: 'Fibre' } as const;

export const TERMINAL_WORDS: Record<Terminal, string> = {
  swaged: 'Swaged terminal',
  mechanical: 'Swageless terminal (cone or wedge)',
  'poured-socket': 'Poured socket (resin or zinc)',
  'ferrule-eye': 'Ferrule-secured eye',
  'cold-head': 'Cold-formed head',
  'spliced-eye': 'Spliced eye',
  unknown: 'Not known',
};

/** Ends each kind of wire can have; the same rows as the reference data's terminals. */
const TERMINALS_OF_WIRE: Record<FittedPartDto['kindOfWire'], Terminal[]> = {
  strand: ['swaged', 'mechanical', 'poured-socket', 'ferrule-eye', 'spliced-eye', 'unknown'],
  rod: ['cold-head', 'unknown'],
  fibre: ['spliced-eye', 'unknown'],
};

export function terminalsFor(kindOfWire: FittedPartDto['kindOfWire'] | undefined): Terminal[] {
  return kindOfWire ? TERMINALS_OF_WIRE[kindOfWire] : ['unknown'];
}

export const BREAKING_LOAD_SOURCE_WORDS: Record<FittedPartDto['breakingLoadSource'], string> = {
  certificate: 'from the certificate',
  table: 'from the table of the construction',
  'table-lower-grade': 'the lower grade of the table, because no certificate says which',
};
