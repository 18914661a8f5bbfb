const colour = process.stdout.isTTY && !process.env.NO_COLOR;

const bold = (text: string): string => (colour ? `\u001b[1m${text}\u001b[0m` : text);

/** One line of progress: what is going on now. */
export function say(line: string): void {
  console.log(line);
}

/** A line that stands out. */
export function announce(line: string): void {
  console.log(bold(line));
}

/** A line that says what is wrong. */
export function warn(line: string): void {
  console.error(bold(line));
}

/** Runs a step and says how long it took where that was worth mentioning. */
export async function step<T>(what: string, work: () => Promise<T>): Promise<T> {
  const begun = Date.now();
  say(what);
  const result = await work();
  const seconds = (Date.now() - begun) / 1000;
  if (seconds >= 3) say(`  done after ${Math.round(seconds)} s`);
  return result;
}
