import '@stayledger/shared/contracts/without-eval';
import { cleanup } from '@testing-library/react';
import { afterEach } from 'vitest';

afterEach(() => cleanup());

// jsdom lays nothing out: no media queries, no sizes. Specs that need a dark or narrow page say so by `mediaMatches`.
export const mediaMatches = new Set<string>();
Object.defineProperty(window, 'matchMedia', {
  configurable: true,
  value: (query: string) => ({
    matches: mediaMatches.has(query),
    media: query,
    addEventListener: () => undefined,
    removeEventListener: () => undefined,
    addListener: () => undefined,
    removeListener: () => undefined,
  }),
});
class StillResizeObserver {
  observe() {}
  unobserve() {}
  disconnect() {}
}
Object.defineProperty(window, 'ResizeObserver', { configurable: true, value: StillResizeObserver });
Object.defineProperty(window, 'scrollTo', { configurable: true, value: () => undefined });
