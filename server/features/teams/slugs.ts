const longest = 60;

/** A slug out of a name: Latin letters without their marks, digits, hyphens; `team` where nothing is left. */
export const slugOf = (name: string): string =>
  name
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .slice(0, longest)
    .replace(/^-+|-+$/g, '') || 'team';

/** The same with a number, where it is taken. */
export function numberedSlug(slug: string, number: number): string {
  const ending = `-${number}`;
  return slug.slice(0, longest - ending.length).replace(/-+$/, '') + ending;
}
