import { useEffect, useState } from 'react';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import { thumbhashAddress } from '../../ui/thumbhash-address.ts';

interface Props {
  frame: FrameItem;
  /** Address of the 2560 px picture, once it is known. */
  large: string | undefined;
}

/** A frame as large as its place allows, never cropped; the smaller picture stands in until the large one is there. */
export function LargePicture({ frame, large }: Props) {
  const width = frame.width || 3;
  const height = frame.height || 2;
  const standIn = frame.pictures?.['960'] ?? thumbhashAddress(frame.placeholder);
  return (
    <div className="grid size-full place-items-center [container-type:size]">
      <div
        className="relative bg-line bg-size-[100%_100%]"
        style={{
          width: `min(100cqw, calc(100cqh * ${width} / ${height}))`,
          aspectRatio: `${width} / ${height}`,
          ...(standIn ? { backgroundImage: `url("${standIn}")` } : {}),
        }}
      >
        {frame.state === 'ready' ? <Sharp key={large} address={large} frame={frame} /> : <Instead frame={frame} />}
      </div>
    </div>
  );
}

function Sharp({ address, frame }: { address: string | undefined; frame: FrameItem }) {
  const [there, setThere] = useState(false);
  const [failed, setFailed] = useState(false);
  return (
    <>
      {failed ? <p className="absolute inset-x-0 bottom-0 bg-sheet p-3">The large picture could not be loaded.</p> : null}
      <img
        src={address}
        alt={frame.name}
        draggable={false}
        className={`absolute inset-0 size-full ${there ? '' : 'opacity-0'}`}
        onLoad={() => setThere(true)}
        onError={() => setFailed(true)}
      />
    </>
  );
}

function Instead({ frame }: { frame: FrameItem }) {
  return (
    <p className="absolute inset-0 grid place-items-center bg-sheet p-6 text-center">
      {frame.state === 'failed' ? `${frame.name} could not be read. ${frame.problem ?? ''}` : 'This frame is being read.'}
    </p>
  );
}

/** Has the browser fetch pictures that are likely to be looked at next. */
export function usePreloaded(addresses: readonly (string | undefined)[]): void {
  const wanted = addresses.filter((address) => address !== undefined).join('\n');
  useEffect(() => {
    const pictures = wanted.split('\n').map((address) => {
      const picture = new Image();
      if (address !== '') picture.src = address;
      return picture;
    });
    // Leaving quickly must not keep the line busy with what nobody waits for.
    return () => pictures.forEach((picture) => picture.removeAttribute('src'));
  }, [wanted]);
}
