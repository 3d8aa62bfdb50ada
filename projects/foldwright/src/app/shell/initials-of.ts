/** First letters of the first and last word of a name. */
export function initialsOf(name: string): string {
  const words = name
    .trim()
    .split(/\s+/)
    .filter((word) => word !== '');
  const [first, last] = [words[0] ?? '', words.length > 1 ? (words[words.length - 1] ?? '') : ''];
  return `${first.charAt(0)}${last.charAt(0)}`.toUpperCase();
}
