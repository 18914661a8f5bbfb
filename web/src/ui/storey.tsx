import type { ReactNode } from 'react';
import { joinClasses } from './join-classes.ts';

interface Props {
  /** Above the heading: "View 1 · 2 picked". */
  lettering: ReactNode;
  title: string;
  /** Below the heading: what was asked for. */
  note?: ReactNode;
  children: ReactNode;
  /** narrow: the gutter of lists such as the desk. */
  gutter?: 'wide' | 'narrow';
  headingLevel?: 'h2' | 'h3';
  className?: string;
}

/** The triangle that marks a level in a section drawing. */
export function LevelMark({ className }: { className?: string }) {
  return (
    <svg width="14" height="10" viewBox="0 0 14 10" aria-hidden="true" className={className}>
      <path d="M0 0H14L7 10Z" fill="currentColor" />
    </svg>
  );
}

/** The words of a storey, as they stand in its gutter. */
export function StoreyWords({ lettering, title, note, headingLevel: Heading = 'h2' }: Omit<Props, 'children' | 'className' | 'gutter'>) {
  return (
    <div className="relative pt-3 pr-10 pb-2 md:pr-5">
      <LevelMark className="absolute top-0 right-1 md:right-4" />
      <p className="lettering">{lettering}</p>
      <Heading className="mt-0.5 text-17 wrap-break-word">{title}</Heading>
      {note ? <div className="mt-0.5 text-13 text-mute wrap-break-word">{note}</div> : null}
    </div>
  );
}

/** A storey of the building: its level line and words at the left, what hangs there at the right. */
export function Storey({ children, gutter = 'wide', className, ...words }: Props) {
  return (
    <section
      className={joinClasses(
        'border-t border-ink md:grid',
        gutter === 'wide' ? 'md:grid-cols-[214px_minmax(0,1fr)]' : 'md:grid-cols-[168px_minmax(0,1fr)]',
        className,
      )}
    >
      <StoreyWords {...words} />
      <div className="min-w-0">{children}</div>
    </section>
  );
}
