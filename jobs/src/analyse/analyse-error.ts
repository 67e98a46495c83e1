/** Something the person at the shell has to mend: said in one line, exit status 2. */
export class AnalyseError extends Error {
  override name = 'AnalyseError';
}
