import { useEffect, useImperativeHandle, useRef, useState, type ReactNode, type Ref } from 'react';
import { derivativeWidth } from '../../ui/picture.tsx';
import { thumbhashAddress } from '../../ui/thumbhash-address.ts';
import { fitInto, fullScale, type Size } from '../viewer/stage-view.ts';
import { useStage } from '../viewer/use-stage.ts';
import { ClippingStripes, ClippingWords, useClipping } from './clipping-overlay.tsx';

const LARGE = 2560;

export interface FrameStageHandle {
  /** Between the whole picture and one of its pixels a screen pixel. */
  toggle(): void;
  /** Moves a picture at 100% by so many CSS pixels. */
  pan(x: number, y: number): void;
}

/** One of the pictures that lie over each other. */
export interface Layer {
  name: string;
  /** Address of the 2560 px picture, once it is known. */
  large: string | undefined;
  /** Address of a smaller one, which stands in until the large one is there. */
  medium: string | undefined;
  placeholder: string | null;
}

interface Props {
  /** Pixels; all layers have these proportions. */
  size: Size;
  shown: Layer;
  /** Large pictures that are kept ready beneath, so that changing to them is instant. */
  ready: readonly (string | undefined)[];
  clipping: boolean;
  /** Drawn over the picture, as large as it. */
  over: ReactNode;
  onFull: (isFull: boolean) => void;
  onStep: (to: 'next' | 'previous') => void;
  ref?: Ref<FrameStageHandle>;
}

/** A picture as large as its place allows, never cropped, or at 100%. What is shown may change; how it lies stays. */
export function FrameStage({ size, shown, ready, clipping, over, onFull, onStep, ref }: Props) {
  const stage = useRef<HTMLDivElement>(null);
  const room = useRoom(stage);
  const width = derivativeWidth({ ...size }, LARGE);
  const picture = { width, height: (width * size.height) / Math.max(size.width, 1) };
  const fitted = fitInto(picture, room, window.devicePixelRatio);
  const full = fullScale(picture, fitted, window.devicePixelRatio);
  const { view, drift, isFull, toggle, pan, handlers } = useStage({ stage, fitted, full, onSwipe: onStep });
  useImperativeHandle(ref, () => ({ toggle: () => toggle(), pan }));
  useEffect(() => onFull(isFull), [isFull, onFull]);
  const clipped = useClipping(clipping ? shown.large : undefined);
  const standIn = shown.medium ?? thumbhashAddress(shown.placeholder);
  return (
    <div
      ref={stage}
      {...handlers}
      className={`absolute inset-0 overflow-hidden ${isFull ? 'cursor-grab touch-none active:cursor-grabbing' : 'touch-pan-y'}`}
    >
      <div
        data-stage-picture
        className="absolute top-1/2 left-1/2 bg-line bg-size-[100%_100%]"
        style={{
          width: fitted.width * view.scale,
          height: fitted.height * view.scale,
          transform: `translate(-50%, -50%) translate(${view.x + drift}px, ${view.y}px)`,
          ...(standIn ? { backgroundImage: `url("${standIn}")` } : {}),
        }}
      >
        <Layers shown={shown} ready={ready} />
        {clipping ? <ClippingStripes clipping={clipped} /> : null}
        {over}
      </div>
      {clipping ? <ClippingWords clipping={clipped} /> : null}
    </div>
  );
}

function Layers({ shown, ready }: Pick<Props, 'shown' | 'ready'>) {
  const [loaded, setLoaded] = useState<ReadonlySet<string>>(new Set());
  const [failed, setFailed] = useState<string>();
  const addresses = [...new Set([...ready, shown.large].filter((address) => address !== undefined))];
  return (
    <>
      {addresses.map((address) => (
        <img
          key={address}
          src={address}
          alt={address === shown.large ? shown.name : ''}
          draggable={false}
          className={`absolute inset-0 size-full select-none ${address !== shown.large ? 'invisible' : loaded.has(address) ? '' : 'opacity-0'}`}
          onLoad={() => setLoaded((before) => new Set([...before, address]))}
          onError={() => setFailed(address)}
        />
      ))}
      {failed !== undefined && failed === shown.large ? (
        <p className="absolute inset-x-0 bottom-0 bg-sheet p-3 text-ink">The large picture could not be loaded.</p>
      ) : null}
    </>
  );
}

function useRoom(element: { current: HTMLElement | null }): Size {
  const [room, setRoom] = useState<Size>({ width: 0, height: 0 });
  useEffect(() => {
    const watched = element.current;
    if (!watched) return;
    const read = () => setRoom({ width: watched.clientWidth, height: watched.clientHeight });
    const observer = new ResizeObserver(read);
    observer.observe(watched);
    read();
    return () => observer.disconnect();
  }, [element]);
  return room;
}
