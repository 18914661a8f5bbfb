import { useCallback, useEffect, useState } from 'react';

/** A picture stays this long at least: slower than the three flashes a second that WCAG 2.3.1 allows, and calm enough to compare. */
const STAYS_MS = 1000;

export interface Blink {
  /** The other picture is shown in place of the one looked at. */
  other: boolean;
  /** It goes back and forth by itself. */
  running: boolean;
  /** Shows the other picture while a key is held. */
  hold: (held: boolean) => void;
  /** Begins or ends going back and forth; where motion is unwanted each press shows the other picture, or the first again. */
  press: () => void;
}

/** Two pictures in one place, one shown for the other. `subject` names what is looked at: where it changes, blinking ends. */
export function useBlink(subject: string): Blink {
  const [state, setState] = useState({ subject, other: false, running: false });
  const now = state.subject === subject ? state : { subject, other: false, running: false };
  useEffect(() => {
    if (!now.running) return;
    const timer = setInterval(() => setState((before) => ({ ...before, other: !before.other })), STAYS_MS);
    return () => clearInterval(timer);
  }, [now.running]);
  const hold = useCallback((held: boolean) => setState({ subject, other: held, running: false }), [subject]);
  useEffect(() => {
    // A key that is let go in another window is never heard of.
    const letGo = () => hold(false);
    window.addEventListener('blur', letGo);
    return () => window.removeEventListener('blur', letGo);
  }, [hold]);
  const press = () => {
    const still = window.matchMedia('(prefers-reduced-motion: reduce)').matches;
    if (still) setState({ subject, other: !now.other, running: false });
    else setState({ subject, other: !now.running, running: !now.running });
  };
  return { other: now.other, running: now.running, hold, press };
}
