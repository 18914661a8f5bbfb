import path from 'node:path';
import { headroomWords } from '../../api/domain/headroom.ts';
import type { BracketFinding, FileFinding, Findings, UseFinding } from './findings.ts';

function sayUses(uses: readonly UseFinding[]): string[] {
  const sharp = uses.filter((use) => use.sharp).map(({ title }) => title);
  const others = uses.filter((use) => !use.sharp).map(({ title, says }) => `${title}: ${says}`);
  return [`Sharp for: ${sharp.length > 0 ? sharp.join(', ') : 'none of the usual uses'}`, ...others];
}

function sayFile(finding: FileFinding): string {
  const { settings, ev100 } = finding;
  const shot = [finding.says, settings.takenAt?.replace('T', ' ')].filter(Boolean).join(', ');
  const lines = [
    shot === '' ? 'No settings in this file' : shot,
    ...(ev100 === null ? [] : [`EV ${ev100.toFixed(1)} at ISO 100`]),
    headroomWords(finding.headroom),
    ...finding.checks.map(({ says, toCheck }) => `${toCheck ? 'To check' : 'Good to know'}: ${says}`),
    ...sayUses(finding.uses),
  ];
  return [`${finding.file}  ${finding.width} × ${finding.height}`, ...lines.map((line) => `  ${line}`)].join('\n');
}

function sayBracket({ files, lead, says, merged }: BracketFinding): string {
  const lines = [
    `Bracket: ${says}`,
    `  ${files.map((file) => path.basename(file)).join(', ')}; lead ${path.basename(lead)}`,
    ...(merged ? [`  ${merged.says}: ${merged.file}`] : []),
  ];
  return lines.join('\n');
}

function counted(count: number, one: string): string {
  return `${count} ${one}${count === 1 ? '' : 's'}`;
}

/** The findings for people to read. */
export function sayFindings({ files, brackets }: Findings): string {
  if (files.length === 0) return '';
  const inBrackets = brackets.reduce((sum, bracket) => sum + bracket.files.length, 0);
  const total = `${counted(files.length, 'file')}: ${counted(brackets.length, 'bracket')}, ${counted(files.length - inBrackets, 'single frame')}`;
  return [...files.map(sayFile), ...brackets.map(sayBracket), total].join('\n\n');
}
