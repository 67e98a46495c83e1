import '@stayledger/shared/contracts/without-eval';
import { cleanup, configure } from '@testing-library/react';
import { afterEach } from 'vitest';

// A page comes in a chunk of its own and a busy machine takes its time; nothing waits longer than it must.
configure({ asyncUtilTimeout: 10_000 });

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
