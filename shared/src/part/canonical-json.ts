/**
 * One spelling of a JSON value: keys sorted by code unit, no white space, numbers as JSON writes them, members that are
 * `undefined` left out. Two equal documents have the same text, whatever order their members were written in; a
 * release's hash is taken over it.
 * @throws RangeError for what JSON cannot say (NaN, infinities, functions, bigint)
 */
export function canonicalJson(value: unknown): string {
  if (value === null || typeof value === 'boolean' || typeof value === 'string') return JSON.stringify(value);
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new RangeError(`canonicalJson: ${value} is not a JSON number`);
    return JSON.stringify(value);
  }
  if (Array.isArray(value)) return `[${value.map((item: unknown) => canonicalJson(item)).join(',')}]`;
  if (typeof value === 'object') {
    const members = Object.entries(value)
      .filter(([, member]) => member !== undefined)
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([key, member]) => `${JSON.stringify(key)}:${canonicalJson(member)}`);
    return `{${members.join(',')}}`;
  }
  throw new RangeError(`canonicalJson: a ${typeof value} is not JSON`);
}

/** Whether two JSON values are equal member by member; order of members does not count, order of lists does. */
export function isSameJson(a: unknown, b: unknown): boolean {
  if (Object.is(a, b) || a === b) return true;
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return false;
  if (Array.isArray(a) !== Array.isArray(b)) return false;
  const membersOfA = new Map<string, unknown>(Object.entries(a).filter(([, member]) => member !== undefined));
  const membersOfB = new Map<string, unknown>(Object.entries(b).filter(([, member]) => member !== undefined));
  if (membersOfA.size !== membersOfB.size) return false;
  for (const [key, member] of membersOfA) {
    if (!membersOfB.has(key) || !isSameJson(member, membersOfB.get(key))) return false;
  }
  return true;
}
