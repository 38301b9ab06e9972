/** Bytes of program memory that a board leaves for tables. */
export interface FlashBudget {
  readonly boardName: string;
  readonly flashBytes: number;
}

/** `Within the 1,024 bytes that Small controller leaves for tables: 768 are left.` */
export function sayRoom(bytes: number, { boardName, flashBytes }: FlashBudget): string {
  const count = (value: number) => value.toLocaleString('en');
  const whole = `the ${count(flashBytes)} bytes that ${boardName} leaves for tables`;
  return bytes <= flashBytes
    ? `✓ Within ${whole}: ${count(flashBytes - bytes)} are left.`
    : `✗ Over ${whole}, by ${count(bytes - flashBytes)}.`;
}
