import { useEffect, useRef, useState } from 'react';
import { markClipped } from '../../../../api/domain/clipping.ts';
import { clippedShares, hatchClipped, shareWords } from './clipping-hatch.ts';

type Found = { address: string } & ({ highlights: number; shadows: number } | { failed: true });

/** What is clipped in a picture, drawn over it, and said. The pixels are those of the picture that is looked at. */
export function ClippingOverlay({ address }: { address: string }) {
  const canvas = useRef<HTMLCanvasElement>(null);
  const [found, setFound] = useState<Found>();
  useEffect(() => {
    const picture = new Image();
    picture.onload = () => setFound(draw(picture, canvas.current, address));
    picture.onerror = () => setFound({ address, failed: true });
    picture.src = address;
    return () => {
      picture.onload = picture.onerror = null;
    };
  }, [address]);
  // What was found in another picture is neither drawn nor said.
  const here = found?.address === address ? found : undefined;
  return (
    <>
      <canvas ref={canvas} aria-hidden="true" className={`absolute inset-0 size-full ${here ? '' : 'invisible'}`} />
      <p role="status" className="absolute right-2 bottom-2 left-2 mx-auto w-fit bg-sheet px-2 py-1 text-13 text-ink">
        <Words found={here} />
      </p>
    </>
  );
}

function Words({ found }: { found: Found | undefined }) {
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
