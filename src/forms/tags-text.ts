/** Tags as they are typed: separated by commas, in any case, with spaces around. */
export const readTags = (text: string): string[] => [
  ...new Set(
    text
      .split(',')
      .map((tag) => tag.trim().toLowerCase())
      .filter((tag) => tag !== ''),
  ),
];

export const sayTags = (tags: readonly string[]): string => tags.join(', ');
