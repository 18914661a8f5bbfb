import { useEffect, useRef } from 'react';
import { useTranslation } from 'react-i18next';
import { NavLink, useLocation } from 'react-router-dom';
import { joinClasses } from './join-classes.ts';

export interface Step {
  to: string;
  words: string;
  /** Its one figure: "184", "42 chosen", "–". */
  figure: string;
}

/** A commission's pages as its steps, left to right; drawn below the cells of the title block. */
export function StepBar({ steps, label }: { steps: Step[]; label?: string }) {
  const { t } = useTranslation();
  const bar = useRef<HTMLElement>(null);
  const { pathname } = useLocation();
  // Where not all steps fit, the one that is open has to be seen.
  useEffect(() => {
    const current = bar.current?.querySelector('[aria-current]');
    if (bar.current && current) bar.current.scrollLeft += offsetWithin(current, bar.current);
  }, [pathname]);
  return (
    <nav ref={bar} aria-label={label ?? t('ui.steps')} className="overflow-x-auto border-t border-ink">
      <ul className="flex">
        {steps.map((step, at) => (
          <li key={step.to} className={joinClasses('min-w-20 flex-1', at > 0 && 'border-l border-line')}>
            <NavLink
              to={step.to}
              className={({ isActive }) =>
                joinClasses(
                  'block h-full px-2.5 py-2 lg:px-3.5 -outline-offset-4 focus-visible:shadow-none',
                  isActive ? 'bg-ink text-sheet focus-visible:outline-sheet' : 'text-mute hover:bg-hair',
                )
              }
            >
              {({ isActive }) => (
                <>
                  <span className={joinClasses('block', isActive && 'font-bold')}>{step.words}</span>
                  <span className="block text-13 whitespace-nowrap">{step.figure}</span>
                </>
              )}
            </NavLink>
          </li>
        ))}
      </ul>
    </nav>
  );
}

/** Pixels by which to scroll sideways, so that an element stands in the middle of the box around it. */
function offsetWithin(element: Element, box: Element): number {
  const [inner, outer] = [element.getBoundingClientRect(), box.getBoundingClientRect()];
  return inner.left + inner.width / 2 - (outer.left + outer.width / 2);
}
