import type { ReactNode } from 'react';
import { bracketHeading, leftOutWords, picturesWords } from './bracket-words.ts';
import { stem } from './frame-words.ts';
import type { Section } from './sections.ts';

/** Above a section: what stands together and why, and at the right what can be done with it. */
export function SectionHeading({ section, children }: { section: Section; children: ReactNode }) {
  const { title, more, notes } = wordsOf(section);
  return (
    <div role="rowheader" className="border-t border-ink pt-1.5 pb-2.5">
      <div className="flex min-h-8 flex-wrap items-center justify-between gap-x-4 gap-y-1">
        <h2 className="text-15 font-normal">
          <b>{title}</b> {more ? <span className="text-mute">· {more}</span> : null}
        </h2>
        {children ? <div className="flex flex-wrap gap-2">{children}</div> : null}
      </div>
      {notes.map((note) => (
        <p key={note} className="text-13 text-mute">
          {note}
        </p>
      ))}
    </div>
  );
}

function wordsOf(section: Section): { title: string; more: string; notes: string[] } {
  if (section.kind === 'bracket') {
    const { bracket, frames } = section;
    const lead = frames.find((frame) => frame.id === bracket.leadFrameId);
    const { title, settings } = bracketHeading(bracket, lead);
    return { title, more: [settings, bracket.byHand ? 'by hand' : ''].filter(Boolean).join(' · '), notes: leftOutWords(bracket, frames) };
  }
  if (section.kind === 'alike') return { title: `${picturesWords(section.frames)} alike`, more: sharpnessWords(section), notes: [] };
  return { title: 'Single frames', more: String(section.frames.length), notes: [] };
}

/** "HL_0412 is the sharpest, HL_0414 the softest" */
function sharpnessWords({ sharpest, softest }: Section & { kind: 'alike' }): string {
  if (!sharpest) return 'keep one of them';
  const softer = softest ? `, ${stem(softest.name)} the softest` : '';
  return `${stem(sharpest.name)} is the sharpest${softer}`;
}
