import styles from './first-rows.module.css';

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
                {column}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row, index) => (
            <tr key={index}>
              {columns.map((_, cell) => (
                <td key={cell}>{row[cell] ?? ''}</td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
