import { useEffect, useRef, useState } from 'react';
import { takeDrop } from '../../lib/uploads/dropped-files.ts';
import type { FoundFile } from '../../lib/uploads/found-file.ts';

/**
 * Takes files dropped anywhere on the page, so that nobody has to aim and a miss does not make the browser leave the page.
 * @param onFound is called with groups of files while folders are still being walked
 * @returns whether files are being dragged over the page now
 */
export function useDrop(onFound: (files: FoundFile[]) => void, onTrouble: (sentence: string) => void): boolean {
  const [over, setOver] = useState(false);
  const latest = useRef({ onFound, onTrouble });
  useEffect(() => {
    latest.current = { onFound, onTrouble };
  });
  useEffect(() => {
    const ended = new AbortController();
    const { signal } = ended;
    // Each element that the pointer enters tells of it, before the one it left does.
    let depth = 0;
    const move = (change: number) => {
      depth = Math.max(0, depth + change);
      setOver(depth > 0);
    };
    window.addEventListener('dragenter', (event) => carriesFiles(event) && move(1), { signal });
    window.addEventListener('dragleave', (event) => carriesFiles(event) && move(-1), { signal });
    window.addEventListener('dragover', (event) => carriesFiles(event) && event.preventDefault(), { signal });
    window.addEventListener(
      'drop',
      (event) => {
        if (!carriesFiles(event) || !event.dataTransfer) return;
        event.preventDefault();
        depth = 0;
        setOver(false);
        void walk(takeDrop(event.dataTransfer), latest.current);
      },
      { signal },
    );
    return () => ended.abort();
  }, []);
  return over;
}

function carriesFiles(event: DragEvent): boolean {
  return event.dataTransfer?.types.includes('Files') ?? false;
}

async function walk(
  groups: AsyncGenerator<FoundFile[]>,
  tell: { onFound: (files: FoundFile[]) => void; onTrouble: (sentence: string) => void },
): Promise<void> {
  try {
    for await (const group of groups) tell.onFound(group);
  } catch {
    tell.onTrouble('Some of what was dropped could not be read. Choose those files with the button instead.');
  }
}
