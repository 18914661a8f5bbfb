import { useId, type ReactNode } from 'react';

/** A part of the panel beside the picture, below its line and its lettering. */
export function PanelSection({ title, children }: { title: string; children: ReactNode }) {
  const id = useId();
  return (
    <section aria-labelledby={id}>
      <h2 id={id} className="lettering mb-1.5 border-t border-ink pt-2 font-normal">
        {title}
      </h2>
      {children}
    </section>
  );
}

/** One line of such a part: what, and at the right the answer. Stands in a `dl`. */
export function PanelLine({ what, children }: { what: string; children: ReactNode }) {
  return (
    <div className="flex justify-between gap-4 border-b border-hair py-1">
      <dt className="min-w-0">{what}</dt>
      <dd className="shrink-0 text-right">{children}</dd>
    </div>
  );
}
