import { describe, expect, it } from 'vitest';
import { asProofsWords, bracketHeading, leftOutWords, stepWords } from '../../web/src/features/frames/bracket-words.ts';
import { allBut, countGroups, sectionsOf, type Section } from '../../web/src/features/frames/sections.ts';
import { bracket, frame, membersOf } from './frames-support.ts';

const FIRST = membersOf('one', ['a0', 'a1', 'a2']);
const SECOND = membersOf('two', ['c0', 'c1']);
const CHECK = { check: 'tilt', says: 'The picture leans to the left by 1.2 degrees.', short: 'tilted 1.2°', toCheck: true };
const TILTED = frame('b0', { checks: [CHECK] });
const NOISY = frame('d0', { checks: [{ check: 'iso', says: 'ISO 3200 is unusual.', short: 'ISO 3200', toCheck: false }] });
const SHOWN = [...FIRST, TILTED, ...SECOND, NOISY];
const BRACKETS = new Map([bracket('one', ['a2', 'a0', 'a1']), bracket('two', ['c0', 'c1'])].map((one) => [one.id, one]));

const said = (sections: Section[]) => sections.map(({ kind, frames }) => `${kind} ${frames.map((one) => one.id).join('')}`);

describe('the sections of the Frames page', () => {
  it('are the brackets, their frames darkest first, and then what stands alone', () => {
    expect(said(sectionsOf(SHOWN, BRACKETS, 'all'))).toEqual(['bracket a2a0a1', 'bracket c0c1', 'single b0d0']);
    expect(said(sectionsOf([...SHOWN].reverse(), BRACKETS, 'all'))).toEqual(['bracket c0c1', 'bracket a2a0a1', 'single d0b0']);
  });

  it('are one of them where that is asked for', () => {
    expect(said(sectionsOf(SHOWN, BRACKETS, 'brackets'))).toEqual(['bracket a2a0a1', 'bracket c0c1']);
    expect(said(sectionsOf(SHOWN, BRACKETS, 'single'))).toEqual(['single b0d0']);
    expect(said(sectionsOf(SHOWN, BRACKETS, 'to-check'))).toEqual(['to-check b0']);
  });

  it('leave out of a bracket what is not shown, and take no frame twice or lose one', () => {
    const [, ...rest] = SHOWN;
    expect(said(sectionsOf(rest, BRACKETS, 'all'))[0]).toBe('bracket a2a1');
    const all = sectionsOf(SHOWN, BRACKETS, 'all').flatMap(({ frames }) => frames.map((one) => one.id));
    expect(all.sort()).toEqual(SHOWN.map((one) => one.id).sort());
  });

  it('show the frames of a bracket that is not known as single frames, and no heading where there is no bracket', () => {
    const [only] = sectionsOf(FIRST, new Map(), 'all');
    expect(only).toMatchObject({ kind: 'single', headed: false });
  });

  it('put near-doubles together and name the sharpest; a bracket alone is no group', () => {
    const alike = (group: string, is: 'sharpest' | 'softest' | null = null) => ({ alike: { group, count: 2, is } });
    const doubles = [frame('x', alike('g', 'softest')), frame('y'), frame('z', alike('g', 'sharpest'))];
    const alone = membersOf('one', ['a0', 'a1'], alike('h'));
    const [group, ...others] = sectionsOf([...doubles, ...alone], BRACKETS, 'alike');
    expect(others).toEqual([]);
    expect(group).toMatchObject({ kind: 'alike', sharpest: { id: 'z' }, softest: { id: 'x' } });
  });

  it('are counted as they are shown: hidden frames, and of near-doubles the last one left, aside', () => {
    const hidden = frame('h', { hidden: true, checks: [CHECK] });
    const left = frame('l', { alike: { group: 'g', count: 2, is: null } });
    expect(countGroups([...SHOWN, hidden, left])).toEqual({ brackets: 2, single: 3, 'to-check': 1, alike: 0 });
  });

  it('keep a bracket whole where one of its frames is the sharpest', () => {
    const [kept] = FIRST;
    expect(allBut([...FIRST, TILTED, NOISY], kept ?? TILTED).map((one) => one.id)).toEqual(['b0', 'd0']);
    expect(allBut([TILTED, NOISY], TILTED).map((one) => one.id)).toEqual(['d0']);
  });
});

describe('words about brackets', () => {
  it('stand above one', () => {
    const lead = frame('a', { focalLength: 35 });
    expect(bracketHeading(bracket('one', ['a', 'b', 'c', 'd', 'e']), lead)).toEqual({
      title: 'Bracket of 5',
      settings: '2 stops apart · f/11 · ISO 100 · 35 mm · 17:06:12',
    });
  });

  it('say the step from the lead', () => {
    expect([-4, 0, 2, 1 / 3, -4 / 3, 12, null].map(stepWords)).toEqual(['−4', '0', '+2', '+1/3', '−1 1/3', '+12', '?']);
  });

  it('name what the merged picture is made without', () => {
    const one = bracket('one', ['a', 'b']);
    one.merged.leftOut = [{ frameId: 'b', says: 'The camera moved.' }];
    expect(leftOutWords(one, [frame('a'), frame('b')])).toEqual(['b was left out. The camera moved.']);
  });

  it('count proofs: any frame of a bracket stands for all of it', () => {
    expect(asProofsWords([...FIRST, TILTED])).toBe('1 bracket as one proof and 1 frame');
    expect(asProofsWords([...FIRST, ...SECOND])).toBe('2 brackets as one proof each');
    expect(asProofsWords([TILTED, NOISY])).toBe('2 frames');
  });
});
