import { useEffect, useRef, useState, type RefObject } from 'react';
import { markClipped } from '../../../../api/domain/clipping.ts';
import { clippedShares, hatchClipped, shareWords } from './clipping-hatch.ts';

type Found = { address: string } & ({ highlights: number; shadows: number } | { failed: true });

export interface Clipping {
  /** To be drawn over the picture. */
  canvas: RefObject<HTMLCanvasElement | null>;
  /** Undefined while it is looked for. */
  found: Found | undefined;
}

/** Looks for what is clipped in the picture at an address, in its own pixels; undefined looks for nothing. */
export function useClipping(address: string | undefined): Clipping {
  const canvas = useRef<HTMLCanvasElement>(null);
  const [found, setFound] = useState<Found>();
  useEffect(() => {
    if (address === undefined) return;
    const picture = new Image();
    picture.onload = () => setFound(draw(picture, canvas.current, address));
    picture.onerror = () => setFound({ address, failed: true });
    picture.src = address;
    return () => {
      picture.onload = picture.onerror = null;
    };
  }, [address]);
  // What was found in another picture is neither drawn nor said.
  return { canvas, found: found?.address === address ? found : undefined };
}

function draw(picture: HTMLImageElement, canvas: HTMLCanvasElement | null, address: string): Found {
  const { naturalWidth: width, naturalHeight: height } = picture;
  const pen = canvas?.getContext('2d', { willReadFrequently: true });
  if (!canvas || !pen || width === 0 || height === 0) return { address, failed: true };
  canvas.width = width;
  canvas.height = height;
  pen.drawImage(picture, 0, 0);
  const mask = markClipped(pen.getImageData(0, 0, width, height).data, 4);
  pen.putImageData(new ImageData(hatchClipped(mask, width), width, height), 0, 0);
  return { address, ...clippedShares(mask) };
}

/** Stripes over what is clipped. */
export function ClippingStripes({ clipping: { canvas, found } }: { clipping: Clipping }) {
  return <canvas ref={canvas} aria-hidden="true" className={`absolute inset-0 size-full ${found ? '' : 'invisible'}`} />;
}

/** What the stripes mean, and how much of the picture they cover. */
export function ClippingWords({ clipping: { found } }: { clipping: Clipping }) {
  return (
    <p role="status" className="pointer-events-none absolute right-2 bottom-2 left-2 mx-auto w-fit bg-sheet px-2 py-1 text-13 text-ink">
      <Said found={found} />
    </p>
  );
}

function Said({ found }: { found: Found | undefined }) {
  if (!found) return 'Looking for what is clipped …';
  if ('failed' in found) return 'The picture could not be read.';
  if (found.highlights === 0 && found.shadows === 0) return 'Nothing is clipped.';
  return (
    <>
      <b className="text-copper">Highlights</b> {shareWords(found.highlights)}, stripes rising · <b className="text-verdigris">Shadows</b>{' '}
      {shareWords(found.shadows)}, stripes falling
    </>
  );
}
