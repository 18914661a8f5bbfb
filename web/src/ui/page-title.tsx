import { useEffect, useRef, type ReactNode } from 'react';
import { useLocation } from 'react-router-dom';

interface PageTitleProps {
  /** The words of the heading, and of the browser's tab. */
  title: string;
  /** Added to the tab's words: the studio or the commission. */
  where?: string | undefined;
  /** Shown instead of `title` where the heading holds more than words. */
  children?: ReactNode;
  /** A heading that is read out but not seen. */
  hidden?: boolean;
  /** False where the page puts the focus somewhere better itself. */
  takesFocus?: boolean;
  /** Instead of the usual size. */
  className?: string;
}

/**
 * The one h1 of a page. After a change of page it takes the focus, so that a screen reader reads where one is now
 * and Tab goes on from the top; on the first page the browser's own start is left alone.
 */
export function PageTitle({ title, where, children, hidden, takesFocus = true, className }: PageTitleProps) {
  const heading = useRef<HTMLHeadingElement>(null);
  const { key } = useLocation();
  useEffect(() => {
    if (takesFocus && key !== 'default') heading.current?.focus({ preventScroll: true });
    // Once a page: later changes of the address (a filter, a sort) leave the focus where it is.
    // eslint-disable-next-line react-hooks/exhaustive-deps
  }, []);
  return (
    <>
      <title>{[title, where, 'Oriel'].filter(Boolean).join(' · ')}</title>
      <h1 ref={heading} tabIndex={-1} className={hidden ? 'sr-only' : (className ?? 'text-30')}>
        {children ?? title}
      </h1>
    </>
  );
}
