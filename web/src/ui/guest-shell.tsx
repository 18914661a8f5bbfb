import type { ReactNode } from 'react';
import { Logo } from './logo.tsx';

interface GuestShellProps {
  /** The studio's name; Oriel's own where no studio is known. */
  studio?: string | undefined;
  /** At the right of the head: who is signed in, the surround … */
  aside?: ReactNode;
  /** Fixed to the lower edge: counts and the next step. */
  foot?: ReactNode;
  children: ReactNode;
}

/** The frame of every page a guest sees: the studio's name at the top, the page's own width below it. */
export function GuestShell({ studio, aside, foot, children }: GuestShellProps) {
  return (
    <div className="flex min-h-dvh flex-col">
      <header className="flex min-h-12 items-center justify-between gap-4 border-b border-ink px-4 py-2 md:border-0 md:px-10 md:pt-5">
        <p className="flex min-w-0 items-center gap-2.5 text-17 font-black md:text-22">
          <span className="hidden md:inline">
            <Logo />
          </span>
          <span className="truncate">{studio ?? 'Oriel'}</span>
        </p>
        {aside ? <div className="flex min-w-0 items-center gap-3 text-13 text-mute">{aside}</div> : null}
      </header>
      <main id="content" tabIndex={-1} className="flex flex-1 flex-col px-4 pt-3 md:px-10">
        {children}
      </main>
      {foot ? (
        <footer data-foot className="sticky bottom-0 z-20 border-t border-ink bg-sheet px-4 py-3 md:px-10">
          {foot}
        </footer>
      ) : null}
    </div>
  );
}
