/** What canonical JSON is made of. */
export type CanonicalValue =
  string | number | boolean | null | readonly CanonicalValue[] | { readonly [key: string]: CanonicalValue };

/**
 * JSON with one spelling per value: keys sorted by code unit, no spaces, numbers as JavaScript writes them (the
 * shortest decimal that reads back as the same double). In the manner of RFC 8785.
 *
 * @throws TypeError for numbers JSON has no word for
 */
export function canonicalJson(value: CanonicalValue): string {
  if (typeof value === 'number' && !Number.isFinite(value)) {
    throw new TypeError(`JSON cannot hold the number ${value}`);
  }
  if (value === null || typeof value !== 'object') return JSON.stringify(value);
  if (isList(value)) return `[${value.map(canonicalJson).join(',')}]`;
  const members = Object.keys(value)
    .sort()
    .map((key) => `${JSON.stringify(key)}:${canonicalJson(value[key])}`);
  return `{${members.join(',')}}`;
}

function isList(value: object): value is readonly CanonicalValue[] {
  return Array.isArray(value);
}
