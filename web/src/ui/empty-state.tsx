import type { ReactNode } from 'react';

interface Props {
  /** What is not here: "No frames yet". */
  title: string;
  /** Why, and what will be here. */
  children?: ReactNode;
  /** The first thing to do about it. */
  action?: ReactNode;
}

/** An empty place in the drawing, with the reason and the first step. */
export function EmptyState({ title, children, action }: Props) {
  return (
    <div className="border border-dashed border-grey bg-sheet px-6 py-10 text-center">
      <p className="text-17 font-bold">{title}</p>
      {children ? <div className="mx-auto mt-1 max-w-xl text-mute">{children}</div> : null}
      {action ? <div className="mt-4 flex justify-center gap-2">{action}</div> : null}
    </div>
  );
}
