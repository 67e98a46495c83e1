import {
  createContext,
  useContext,
  useEffect,
  useLayoutEffect,
  useMemo,
  useState,
  type ReactNode,
} from 'react';
import type { Preferences } from '@stayledger/shared/contracts/auth';
import { COLOURS, PHONE_MAX_PX, type ColourMode, type ColourTokens } from './tokens';

type ThemeChoice = Preferences['theme'];
const STORAGE_KEY = 'stayledger.theme';

interface ColourModeValue {
  mode: ColourMode;
  choice: ThemeChoice;
  colours: ColourTokens;
  choose: (choice: ThemeChoice) => void;
}

const ColourModeContext = createContext<ColourModeValue | null>(null);

/** Holds light or dark: the person's choice where there is one, else what the system says. */
export function ColourModeProvider({ children }: { children: ReactNode }) {
  const [choice, setChoice] = useState<ThemeChoice>(rememberedChoice);
  const systemIsDark = useMediaQuery('(prefers-color-scheme: dark)');
  const mode: ColourMode = choice === 'system' ? (systemIsDark ? 'dark' : 'light') : choice;

  useLayoutEffect(() => {
    document.documentElement.dataset.theme = mode;
  }, [mode]);

  const value = useMemo<ColourModeValue>(
    () => ({
      mode,
      choice,
      colours: COLOURS[mode],
      choose: (next) => {
        rememberChoice(next);
        setChoice(next);
      },
    }),
    [mode, choice],
  );
  return <ColourModeContext.Provider value={value}>{children}</ColourModeContext.Provider>;
}

export function useColourMode(): ColourModeValue {
  const value = useContext(ColourModeContext);
  if (!value) throw new Error('useColourMode stands outside ColourModeProvider.');
  return value;
}

/** True on widths that count as a phone. */
export function useIsPhone(): boolean {
  return useMediaQuery(`(max-width: ${PHONE_MAX_PX}px)`);
}

function useMediaQuery(query: string): boolean {
  const [matches, setMatches] = useState(() => window.matchMedia(query).matches);
  useEffect(() => {
    const list = window.matchMedia(query);
    const follow = () => setMatches(list.matches);
    follow();
    list.addEventListener('change', follow);
    return () => list.removeEventListener('change', follow);
  }, [query]);
  return matches;
}

// A browser may refuse storage altogether (private windows); the choice then lasts as long as the page.
function rememberedChoice(): ThemeChoice {
  try {
    const stored = window.localStorage.getItem(STORAGE_KEY);
    return stored === 'light' || stored === 'dark' ? stored : 'system';
  } catch {
    return 'system';
  }
}

function rememberChoice(choice: ThemeChoice): void {
  try {
    window.localStorage.setItem(STORAGE_KEY, choice);
  } catch {
    return;
  }
}
