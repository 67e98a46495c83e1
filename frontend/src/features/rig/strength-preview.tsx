import type { DescribedPartInput } from '@stayledger/shared/contracts/parts';
import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useFormat } from '../../lib/formatting/use-format';
import { partStrength } from './rig.mutations';

/** Strength of the assembly as described so far, and its weakest element. */
export function StrengthPreview({ input }: { input: DescribedPartInput | null }) {
  const format = useFormat();
  const { data } = useQuery({
    queryKey: ['rig', 'strength', input] as const,
    queryFn: () => (input ? partStrength(input) : null),
    enabled: input !== null,
    placeholderData: keepPreviousData,
    retry: false,
  });
  if (!input || !data) return null;
  return (
    <p role="status">
      {data.breakingLoadKn === null
        ? 'The strength of the assembly is not known.'
        : `As described, the assembly breaks at ${format.force(data.breakingLoadKn)}, set by the ${data.weakestElement ?? 'weakest element'}.`}
      {data.unknownElements.length > 0
        ? ` Not known: ${data.unknownElements.join(', ')}; margins stay provisional.`
        : ''}
    </p>
  );
}
