import type { LoadLogDto, LoadLogState } from '@stayledger/shared/contracts/load-logs';

interface StateWords {
  /** The word in tables. */
  word: string;
  /** What it means and what comes next, one sentence. */
  meaning: string;
  /** True while the server works on it without anybody's help: worth asking again each second. */
  moving: boolean;
}

const WORDS: Record<LoadLogState, StateWords> = {
  receiving: {
    word: 'Being received',
    meaning: 'The file is not here in full yet.',
    moving: true,
  },
  received: {
    word: 'Waiting to be counted',
    meaning: 'The file is here. Counting begins by itself.',
    moving: true,
  },
  counting: {
    word: 'Being counted',
    meaning: 'Cycles are being counted.',
    moving: true,
  },
  counted: {
    word: 'Waiting for review',
    meaning: 'Counted. Nothing reaches the ledger until a person posts it.',
    moving: false,
  },
  posted: {
    word: 'Posted to the ledger',
    meaning: 'Its cycles stand in the accounts of the parts.',
    moving: false,
  },
  'set-aside': { word: 'Set aside', meaning: 'Kept, but it counts towards no part.', moving: false },
  failed: {
    word: 'Could not be read',
    meaning: 'Nothing was counted. What is wrong stands below.',
    moving: false,
  },
};

/** How a load log's state reads to people. */
export function loadLogStateWords(state: LoadLogState): StateWords {
  return WORDS[state];
}

const GIVEN_UP: StateWords = {
  word: 'Upload given up',
  meaning: 'The file never came in full. Add it anew.',
  moving: false,
};

/** The words of a log's state, told apart where the server keeps one state for two things that happened. */
export function loadLogWords(log: Pick<LoadLogDto, 'state' | 'failure'>): StateWords {
  const code = log.failure?.code;
  if (log.state === 'failed' && (code === 'upload-cancelled' || code === 'upload-abandoned')) return GIVEN_UP;
  return loadLogStateWords(log.state);
}
