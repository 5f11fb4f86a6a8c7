import { readFileSync, readlinkSync } from 'node:fs';

/**
 * A process by number and time of start: numbers are used again, and a signal must never reach a stranger.
 * @returns null where no such process runs
 */
export function identify(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    // Fields after the name in brackets; the 20th of them is the time of start.
    const [state, ...fields] = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
    return state === 'Z' ? null : { pid, startedAt: fields[18] };
  } catch (error) {
    if (error.code === 'ENOENT' || error.code === 'ESRCH') return null;
    throw error;
  }
}

/** Whether that very process still runs. */
export const isStillThere = ({ pid, startedAt }) => identify(pid)?.startedAt === startedAt;

/** Folder a process works in, or null. */
export function workingDirectory(pid) {
  try {
    return readlinkSync(`/proc/${pid}/cwd`);
  } catch {
    return null;
  }
}
