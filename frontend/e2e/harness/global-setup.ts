import type { TestProject } from 'vitest/node';
import { startStack } from './stack';

declare module 'vitest' {
  export interface ProvidedContext {
    baseUrl: string;
  }
}

/** One product for all journeys: they keep apart by the vessels they register, as people would. */
export default async function setUp(project: TestProject): Promise<() => Promise<void>> {
  const stack = await startStack();
  project.provide('baseUrl', stack.baseUrl);
  return stack.stop;
}
