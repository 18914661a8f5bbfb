import type { KeyboardEvent } from 'react';

export interface ViewerDeeds {
  previous: () => void;
  next: () => void;
  /** Through the pictures of a bracket. */
  darker: () => void;
  brighter: () => void;
  pan: (x: number, y: number) => void;
  zoom: () => void;
  clipping: () => void;
  guides: () => void;
  surround: () => void;
  help: () => void;
}

const PAN = 120;
const WAYS: Record<string, [number, number]> = { ArrowLeft: [1, 0], ArrowRight: [-1, 0], ArrowUp: [0, 1], ArrowDown: [0, -1] };

/** The keys of a photographer's viewer. Arrows within a menu belong to the menu, which keeps them from coming here. */
export function pressInViewer(event: KeyboardEvent, deeds: ViewerDeeds): void {
  if (event.altKey || event.ctrlKey || event.metaKey) return;
  const way = WAYS[event.key];
  const act = event.shiftKey && way ? () => deeds.pan(way[0] * PAN, way[1] * PAN) : deedOf(event.key, deeds);
  if (!act) return;
  event.preventDefault();
  act();
}

function deedOf(key: string, deeds: ViewerDeeds): (() => void) | undefined {
  switch (key.length === 1 ? key.toLowerCase() : key) {
    case 'ArrowLeft':
      return deeds.previous;
    case 'ArrowRight':
      return deeds.next;
    case 'ArrowUp':
      return deeds.darker;
    case 'ArrowDown':
      return deeds.brighter;
    case 'z':
      return deeds.zoom;
    case 'h':
      return deeds.clipping;
    case 'g':
      return deeds.guides;
    case 's':
      return deeds.surround;
    case '?':
      return deeds.help;
    default:
      return undefined;
  }
}
