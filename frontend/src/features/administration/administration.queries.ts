import { auditPageSchema } from '@stayledger/shared/contracts/audit';
import { firmPageSchema } from '@stayledger/shared/contracts/firms';
import { jobPageSchema } from '@stayledger/shared/contracts/jobs';
import { userPageSchema } from '@stayledger/shared/contracts/users';
import { infiniteQueryOptions } from '@tanstack/react-query';
import { apiGet } from '../../lib/api-client';
import type { Contract } from '../../lib/contract';

interface Page<Item> {
  items: Item[];
  nextCursor: string | null;
}

function pages<Item>(path: string, schema: Contract<Page<Item>>) {
  return infiniteQueryOptions({
    queryKey: ['administration', path] as const,
    queryFn: ({ pageParam, signal }): Promise<Page<Item>> =>
      apiGet(path, schema, { query: { cursor: pageParam }, signal }),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.nextCursor ?? undefined,
  });
}

export const administrationQueries = {
  users: () => pages('/users', userPageSchema),
  firms: () => pages('/firms', firmPageSchema),
  jobs: () => ({ ...pages('/jobs', jobPageSchema), refetchInterval: 5_000 }),
  audit: () => pages('/audit-events', auditPageSchema),
};
