/** Options whose flag has a word of its own. */
const ownFlags: ReadonlyMap<string, string> = new Map([['arrayName', '--name']]);

/** The command line's flag for a target's option: `arrayName` is `--name`, `highPort` is `--high-port`. */
export function flagOf(option: string): string {
  return ownFlags.get(option) ?? `--${option.replace(/[A-Z]/g, (letter) => `-${letter.toLowerCase()}`)}`;
}

/** The option behind a flag: `--high-port` is `highPort`. */
export function optionOf(flag: string): string {
  for (const [option, own] of ownFlags) if (own === flag) return option;
  return flag.replace(/^--/, '').replace(/-([a-z])/g, (_hyphen, letter: string) => letter.toUpperCase());
}
