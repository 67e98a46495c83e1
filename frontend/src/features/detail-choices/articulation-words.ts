import type { DetailChoiceDto } from '@stayledger/shared/contracts/detail-choices';

/** How an end turns, as people at the mast say it. */
export const ARTICULATION_CHOICE_WORDS: Record<NonNullable<DetailChoiceDto['articulation']>, string> = {
  'both-planes': 'turns in both planes',
  'one-plane': 'turns in one plane',
  none: 'does not turn',
  seized: 'should turn, and is seized',
};
