import type { LedgerEntryDto } from '@stayledger/shared/contracts/ledger';

/** Kinds of entries as people read them. */
export const ENTRY_KIND_WORDS: Record<LedgerEntryDto['kind'], string> = {
  'carried-in': 'Carried in',
  recorded: 'Recorded',
  'between-logs': 'Between logs',
  unlogged: 'Unlogged',
  'sampling-correction': 'Sampling correction',
  reversal: 'Reversal',
};
