/** A page of the console with its query. */
export function addressOf(path: string, search: URLSearchParams): string {
  const query = search.toString();
  return query === "" ? path : `${path}?${query}`;
}
