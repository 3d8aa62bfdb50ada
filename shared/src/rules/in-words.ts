/** The text with a capital to begin with. */
export function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** "corner" or "corners", by how many there are. */
export function plural(count: number, one: string, many = `${one}s`): string {
  return count === 1 ? one : many;
}
