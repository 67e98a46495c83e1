import type { FittedPartDto } from '@stayledger/shared/contracts/parts';
import { Attention } from '../../components/feedback/attention';
import { useFormat } from '../../lib/formatting/use-format';
import styles from './rig.module.css';
import { BREAKING_LOAD_SOURCE_WORDS } from './part-words';

/** Breaking load of the assembly as fitted, its weakest element, and what nobody knows about it. */
export function AssemblyStrength({ part }: { part: FittedPartDto }) {
  const format = useFormat();
  const { breakingLoadKn, weakestElement, unknownElements } = part.assembly;
  return (
    <section aria-labelledby="assembly" className={styles.assembly}>
      <h2 id="assembly">Strength as fitted</h2>
      <p>
        Wire alone: {format.force(part.breakingLoadKn)}, {BREAKING_LOAD_SOURCE_WORDS[part.breakingLoadSource]}
        .{' '}
        {breakingLoadKn === null
          ? 'The strength of the assembly is not known.'
          : `Assembly: ${format.force(breakingLoadKn)}, set by the ${weakestElement ?? 'weakest element'}.`}
      </p>
      {unknownElements.length > 0 ? (
        <Attention>
          Not known: {unknownElements.join(', ')}. Margins are provisional until they are.
        </Attention>
      ) : null}
    </section>
  );
}
