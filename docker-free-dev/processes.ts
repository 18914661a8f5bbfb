import { spawn } from 'node:child_process';
import fs from 'node:fs';
import type { Socket } from 'node:net';

/** Who holds something: a process id alone is reused by the kernel, so its start time goes with it. */
export interface ProcessMark {
  pid: number;
  /** Start time in clock ticks since boot (proc(5), /proc/<pid>/stat field 22); null where /proc is missing. */
  startedAt: string | null;
}

/** True while a process with this id exists, whoever owns it. */
export function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return (error as NodeJS.ErrnoException).code === 'EPERM';
  }
}

/** Start time of a process in clock ticks since boot, or null where it is gone. */
export function startTime(pid: number): string | null {
  try {
    const stat = fs.readFileSync(`/proc/${pid}/stat`, 'utf8');
    // The command name (field 2) stands in brackets and may itself hold spaces and brackets.
    return stat.slice(stat.lastIndexOf(')') + 2).split(' ')[19] ?? null;
  } catch {
    return null;
  }
}

/** Words of a process's command line; empty where it is gone or /proc is missing. */
export function commandLine(pid: number): string[] {
  try {
    return fs.readFileSync(`/proc/${pid}/cmdline`, 'utf8').split('\0').filter(Boolean);
  } catch {
    return [];
  }
}

/** The mark of a process, by default of this one. */
export function markOf(pid: number = process.pid): ProcessMark {
  return { pid, startedAt: startTime(pid) };
}

/** True while the very process that left the mark lives (a reused id does not count). */
export function stillRuns(mark: ProcessMark): boolean {
  if (!isAlive(mark.pid)) return false;
  return mark.startedAt === null || mark.startedAt === startTime(mark.pid);
}

/** Reads a mark that `writeMark` left; null where there is none or it is garbled. */
export function readMark(file: string): ProcessMark | null {
  try {
    const mark = JSON.parse(fs.readFileSync(file, 'utf8')) as Partial<ProcessMark>;
    if (!Number.isInteger(mark.pid)) return null;
    return { pid: mark.pid as number, startedAt: mark.startedAt ?? null };
  } catch {
    return null;
  }
}

/** Leaves the mark of this process in a file. */
export function writeMark(file: string): void {
  fs.writeFileSync(file, JSON.stringify(markOf()));
}

/** Waits until a process is gone; false when it still lives after `milliseconds`. */
export async function waitForEnd(pid: number, milliseconds: number): Promise<boolean> {
  const deadline = Date.now() + milliseconds;
  while (isAlive(pid)) {
    if (Date.now() > deadline) return false;
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
  return true;
}

/**
 * Ends `pid` with `signal` when this process dies, however abruptly. A tiny shell waits for the end of a pipe that
 * only we hold; the kernel closes it even after kill -9. Returns a function that dismisses the guard.
 */
export function endWithUs(pid: number, signal: 'INT' | 'TERM' | 'QUIT'): () => void {
  const script = 'trap "" INT TERM HUP; cat >/dev/null 2>&1; kill -s "$1" "$0" 2>/dev/null';
  const guard = spawn('/bin/sh', ['-c', script, String(pid), signal], {
    stdio: ['pipe', 'ignore', 'ignore'],
    detached: true,
  });
  guard.on('error', () => undefined);
  guard.unref();
  const pipe = guard.stdin as unknown as Socket;
  pipe.on('error', () => undefined);
  pipe.unref();
  return () => void guard.kill('SIGKILL');
}
