/** The part of the package that is measured; it ships no types. */
declare module 'papaparse' {
  export function parse<Row>(text: string, options: { skipEmptyLines: boolean }): { data: Row[] };
  const papa: { parse: typeof parse };
  export default papa;
}
