import { useRef, useState, type PointerEvent, type RefObject, type WheelEvent } from 'react';
import { FITTED, keepOnStage, pinch, scaleAt, swipeOf, type Point, type Size, type StageView } from './stage-view.ts';

interface Options {
  stage: RefObject<HTMLElement | null>;
  fitted: Size;
  /** The greatest scale. */
  full: number;
  onSwipe: (to: 'next' | 'previous') => void;
}

interface Gesture {
  pointers: Map<number, Point>;
  /** Where the pointers were, and the view, when the number of fingers last changed. */
  from: Map<number, Point>;
  view: StageView;
  /** The longest way a finger has gone; a tap goes hardly any. */
  moved: number;
}

const TAP = 8;
const DOUBLE_TAP = 320;

/** Zoom and pan by touch, mouse and keys, and the swipe to the neighbour. One state: how the picture lies on the stage. */
export function useStage({ stage, fitted, full, onSwipe }: Options) {
  const [view, setView] = useState<StageView>(FITTED);
  const [drift, setDrift] = useState(0);
  const gesture = useRef<Gesture>({ pointers: new Map(), from: new Map(), view: FITTED, moved: 0 });
  const lastTap = useRef({ at: 0, x: 0, y: 0 });

  const size = (): Size => ({ width: stage.current?.clientWidth ?? 0, height: stage.current?.clientHeight ?? 0 });
  const show = (next: StageView) => setView(keepOnStage(next, fitted, size(), full));
  const pointOf = (event: { clientX: number; clientY: number }): Point => {
    const box = stage.current?.getBoundingClientRect();
    if (!box) return { x: 0, y: 0 };
    return { x: event.clientX - box.left - box.width / 2, y: event.clientY - box.top - box.height / 2 };
  };
  const begin = () => {
    const now = gesture.current;
    now.from = new Map(now.pointers);
    now.view = view;
  };

  const toggle = (point: Point = { x: 0, y: 0 }) => show(view.scale > 1 ? FITTED : scaleAt(view, full, point));

  const tap = (point: Point) => {
    const before = lastTap.current;
    lastTap.current = { at: performance.now(), ...point };
    const isDouble = lastTap.current.at - before.at < DOUBLE_TAP && Math.hypot(point.x - before.x, point.y - before.y) < 40;
    if (isDouble) toggle(point);
    else if (view.scale > 1) show({ ...view, x: view.x - point.x, y: view.y - point.y });
  };

  const onPointerDown = (event: PointerEvent) => {
    if (event.button !== 0) return;
    event.currentTarget.setPointerCapture(event.pointerId);
    const now = gesture.current;
    if (now.pointers.size === 0) now.moved = 0;
    now.pointers.set(event.pointerId, pointOf(event));
    begin();
  };

  const onPointerMove = (event: PointerEvent) => {
    const now = gesture.current;
    const start = now.from.get(event.pointerId);
    if (!start) return;
    const point = pointOf(event);
    now.pointers.set(event.pointerId, point);
    now.moved = Math.max(now.moved, Math.hypot(point.x - start.x, point.y - start.y));
    const [one, other] = [...now.pointers.keys()];
    if (one !== undefined && other !== undefined) {
      const at = (places: Map<number, Point>): [Point, Point] => [places.get(one) ?? point, places.get(other) ?? point];
      now.moved = Infinity;
      setDrift(0);
      show(pinch(now.view, at(now.from), at(now.pointers)));
    } else if (view.scale > 1) show({ ...now.view, x: now.view.x + point.x - start.x, y: now.view.y + point.y - start.y });
    else if (event.pointerType === 'touch') setDrift(point.x - start.x);
  };

  const onPointerUp = (event: PointerEvent) => {
    const now = gesture.current;
    const start = now.from.get(event.pointerId);
    now.pointers.delete(event.pointerId);
    if (!start || now.pointers.size > 0) return begin();
    now.from.clear();
    setDrift(0);
    const point = pointOf(event);
    if (event.type === 'pointercancel') return;
    if (now.moved < TAP) return tap(point);
    const swipe = swipeOf({ x: point.x - start.x, y: point.y - start.y }, size().width);
    if (swipe && view.scale === 1 && event.pointerType === 'touch' && now.moved !== Infinity) onSwipe(swipe);
  };

  const onWheel = (event: WheelEvent) => {
    // A trackpad's pinch comes as a wheel with Ctrl; without it the page scrolls as everywhere.
    if (event.ctrlKey) show(scaleAt(view, view.scale * Math.exp(-event.deltaY / 200), pointOf(event)));
  };

  return {
    view,
    drift,
    isFull: view.scale > 1,
    toggle,
    fit: () => setView(FITTED),
    pan: (x: number, y: number) => show({ ...view, x: view.x + x, y: view.y + y }),
    handlers: { onPointerDown, onPointerMove, onPointerUp, onPointerCancel: onPointerUp, onWheel },
  };
}
