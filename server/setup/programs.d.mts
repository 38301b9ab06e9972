/** The full path of a program in PATH or an sbin folder, or undefined where it is not installed. */
export function findProgram(name: string): string | undefined;
