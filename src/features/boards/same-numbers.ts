export const sameNumbers = (
  one: readonly number[] | undefined,
  other: readonly number[] | undefined,
): boolean =>
  one === other ||
  (one !== undefined &&
    other !== undefined &&
    one.length === other.length &&
    one.every((each, i) => each === other[i]));
