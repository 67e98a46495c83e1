import { useMemo } from 'react';
import { usePreferences } from '../session';
import { createFormatter, type Formatter } from './format';

/** The formatter of the signed-in person's units and decimal mark. */
export function useFormat(): Formatter {
  const preferences = usePreferences();
  return useMemo(() => createFormatter(preferences), [preferences]);
}
