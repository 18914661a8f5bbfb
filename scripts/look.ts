import { HELP, readWishes } from './look/command-line.ts';
import { lookAt } from './look/look-at.ts';
import { sayFindings } from './look/say-findings.ts';

/** Runs the command. Answers its exit code. */
async function look(words: string[]): Promise<number> {
  const { paths, json, merge, help } = readWishes(words);
  if (help) {
    console.log(HELP);
    return 0;
  }
  const findings = await lookAt(paths, merge);
  const text = json ? JSON.stringify(findings, null, 2) : sayFindings(findings);
  if (text !== '') console.log(text);
  for (const { file, says } of findings.problems ?? []) console.error(file === '' ? says : `${file}: ${says}`);
  return findings.problems ? 1 : 0;
}

try {
  process.exitCode = await look(process.argv.slice(2));
} catch (error) {
  console.error(error instanceof Error ? error.message : String(error));
  process.exitCode = 1;
}
