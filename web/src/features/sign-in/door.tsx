import type { ReactNode } from 'react';
import { GuestShell } from '../../ui/guest-shell.tsx';
import { PageTitle } from '../../ui/page-title.tsx';

interface Props {
  title: string;
  /** What this is for, in a sentence or two. */
  lead?: ReactNode;
  /** Below the frame: the other doors. */
  foot?: ReactNode;
  children: ReactNode;
}

/** A page before the studio: one frame in the middle with one thing to do. */
export function Door({ title, lead, foot, children }: Props) {
  return (
    <GuestShell>
      <div className="mx-auto w-full max-w-[440px] py-4 md:py-12">
        <div className="border border-ink bg-sheet">
          <div className="border-b border-ink px-5 py-4 md:px-6">
            <PageTitle title={title} className="text-22 font-black md:text-30" />
            {lead ? <div className="mt-1 text-mute">{lead}</div> : null}
          </div>
          <div className="px-5 py-5 md:px-6">{children}</div>
        </div>
        {foot ? <div className="mt-4 grid gap-1">{foot}</div> : null}
      </div>
    </GuestShell>
  );
}
