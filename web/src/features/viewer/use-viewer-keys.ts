import { useEffect, useRef } from 'react';

export interface ViewerActions {
  previous: () => void;
  next: () => void;
  mark: () => void;
  close: () => void;
  full: () => void;
  fit: () => void;
  surround: () => void;
  guides: () => void;
  help: () => void;
  /** Moves a zoomed picture; the direction in which one wants to look. */
  pan: (x: number, y: number) => void;
  isFull: boolean;
}

const PAN = 120;

/** True where a key belongs to something else: a field, an open dialog or menu. */
function isTaken(target: EventTarget | null): boolean {
  if (!(target instanceof Element)) return false;
  return Boolean(target.closest('input, textarea, select, [contenteditable], dialog, [popover]'));
}

function actionOf(event: KeyboardEvent, actions: ViewerActions, characters: boolean): (() => void) | undefined {
  const pans: Record<string, [number, number]> = { ArrowLeft: [PAN, 0], ArrowRight: [-PAN, 0], ArrowUp: [0, PAN], ArrowDown: [0, -PAN] };
  const pan = pans[event.key];
  if (actions.isFull && pan) return () => actions.pan(...pan);
  const always: Record<string, () => void> = {
    ArrowLeft: actions.previous,
    ArrowRight: actions.next,
    Escape: actions.isFull ? actions.fit : actions.close,
  };
  const onPressable = event.target instanceof Element && event.target.closest('button, a, summary');
  if (event.key === ' ' && !onPressable && !event.repeat) return actions.mark;
  const single: Record<string, () => void> = {
    '+': actions.full,
    '=': actions.full,
    '-': actions.fit,
    s: actions.surround,
    g: actions.guides,
    '?': actions.help,
  };
  return always[event.key] ?? (characters ? single[event.key.toLowerCase()] : undefined);
}

/** The viewer's keys. `characters` false leaves out those that are a letter or a sign (WCAG 2.1.4). */
export function useViewerKeys(actions: ViewerActions, characters: boolean): void {
  const latest = useRef({ actions, characters });
  useEffect(() => {
    latest.current = { actions, characters };
  });
  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent) => {
      if (event.defaultPrevented || event.ctrlKey || event.metaKey || event.altKey || isTaken(event.target)) return;
      const act = actionOf(event, latest.current.actions, latest.current.characters);
      if (!act) return;
      event.preventDefault();
      act();
    };
    document.addEventListener('keydown', onKeyDown);
    return () => document.removeEventListener('keydown', onKeyDown);
  }, []);
}
