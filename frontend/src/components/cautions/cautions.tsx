import styles from './cautions.module.css';

/** Part of every result, not small print: what a figure of this product can and cannot tell. */
export function Cautions({ plain = false }: { plain?: boolean }) {
  return (
    <section aria-labelledby="cautions" className={styles.cautions}>
      <h2 id="cautions">What this cannot tell</h2>
      <ul>
        <li>
          {plain
            ? 'This is an estimate, made from recorded loads and published test curves.'
            : 'This is an estimate of a stated allowance, from recorded loads and published curves.'}
        </li>
        <li>
          Corrosion, damage, defective parts or work, misalignment, overload and events nobody recorded break
          rigs at any figure.
        </li>
        <li>
          It never replaces inspection by a competent person. Allowance left is no reason to pass a calendar,
          builder’s or insurer’s limit.
        </li>
        <li>
          The rules of builder, class society, flag and insurer, and local codes, come first. Licensed naval
          architects, surveyors and riggers decide.
        </li>
      </ul>
    </section>
  );
}
