/** A value that can stand in a path or query. */
export type UrlValue = string | number | boolean | undefined;

/**
 * Address of a route: path parameters filled in, query appended, both encoded. Undefined query members are left out.
 * @param path Express notation, `/api/parts/:partId`
 * @throws RangeError when a path parameter is missing
 */
export function routeUrl(
  path: string,
  params: Readonly<Record<string, UrlValue>> = {},
  query: Readonly<Record<string, UrlValue>> = {},
): string {
  const filled = path.replace(/:([A-Za-z]+)/g, (whole, name: string) => {
    const value = params[name];
    if (value === undefined) throw new RangeError(`routeUrl: ${path} lacks ${whole}`);
    return encodeURIComponent(String(value));
  });
  const search = Object.entries(query)
    .filter(([, value]) => value !== undefined)
    .map(([name, value]) => `${encodeURIComponent(name)}=${encodeURIComponent(String(value))}`)
    .join('&');
  return search === '' ? filled : `${filled}?${search}`;
}
