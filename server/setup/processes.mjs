import { readFileSync } from 'node:fs';

/**
 * A process named so that a later one with the same number is not taken for it: "pid-startTime", the start time in
 * clock ticks since boot as in field 22 of /proc/PID/stat (proc(5)). Undefined where no such process lives.
 */
export function processName(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    const [state, ...rest] = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
    return state === 'Z' ? undefined : `${pid}-${rest[18]}`;
  } catch {
    return undefined;
  }
}

export const isAlive = (name) => processName(name.split('-')[0]) === name;

/** Whether `pid` lives and carries `text` in its command line: a guard against a re-used process number. */
export function runsWith(pid, text) {
  try {
    return processName(pid) !== undefined && readFileSync(`/proc/${pid}/cmdline`, 'utf8').includes(text);
  } catch {
    return false;
  }
}
