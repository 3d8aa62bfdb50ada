/** A title as the last part of an address: "Two-pump water kit" is two-pump-water-kit. */
export function slugOf(title: string): string {
  const slug = title
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 60)
    .replace(/-+$/, '');
  return slug.length < 2 ? 'listing' : slug;
}
