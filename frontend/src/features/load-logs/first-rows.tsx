import styles from './first-rows.module.css';

const SHOWN_LENGTH = 60;

/** A cell of a broken file can be as long as the file. */
function shortened(text: string): string {
  return text.length > SHOWN_LENGTH ? `${text.slice(0, SHOWN_LENGTH)}…` : text;
}

/** The first rows as they stand in the file, so that a person sees at once whether it was read rightly. */
export function FirstRows({
  columns,
  rows,
}: {
  columns: readonly string[];
  rows: readonly (readonly string[])[];
}) {
  return (
    <div className={styles.scroll} role="region" aria-label="First rows of the file" tabIndex={0}>
      <table className={styles.table}>
        <caption className="visually-hidden">First rows of the file</caption>
        <thead>
          <tr>
            {columns.map((column, index) => (
              <th key={index} scope="col">
                {shortened(column)}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row, index) => (
            <tr key={index}>
              {columns.map((_, cell) => (
                <td key={cell}>{shortened(row[cell] ?? '')}</td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
