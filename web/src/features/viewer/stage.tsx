import { useEffect, useRef, useState, type ReactNode, type Ref } from 'react';
import { useImperativeHandle } from 'react';
import { joinClasses } from '../../ui/join-classes.ts';
import { derivativeWidth } from '../../ui/picture.tsx';
import { thumbhashAddress } from '../../ui/thumbhash-address.ts';
import { fitInto, fullScale, type Size } from './stage-view.ts';
import { useStage } from './use-stage.ts';

export interface StageHandle {
  /** Between fitted and one picture pixel a screen pixel. */
  toggle(): void;
  fit(): void;
  /** Moves a zoomed picture by so many CSS pixels; does nothing while it is fitted. */
  pan(x: number, y: number): void;
}

export interface StagePicture extends Size {
  /** Longest side 960 px; what is seen until the large one is there. */
  medium: string | null;
  /** Longest side 2560 px. */
  large: string | null;
  placeholder: string | null;
}

interface Props {
  picture: StagePicture;
  alt: string;
  /** Hung from the picture's top edge while it is fitted. */
  mark?: ReactNode;
  /** Drawn over the picture, at any scale. */
  over?: ReactNode;
  onSwipe: (to: 'next' | 'previous') => void;
  onFull: (isFull: boolean) => void;
  onFailed: () => void;
  /** Told once the large picture is shown: time to fetch the neighbours. */
  onShown: () => void;
  ref?: Ref<StageHandle>;
}

const LARGE = 2560;

function useSize(element: { current: HTMLElement | null }): Size {
  const [size, setSize] = useState<Size>({ width: 0, height: 0 });
  useEffect(() => {
    const watched = element.current;
    if (!watched) return;
    const read = () => setSize({ width: watched.clientWidth, height: watched.clientHeight });
    const observer = new ResizeObserver(read);
    observer.observe(watched);
    read();
    return () => observer.disconnect();
  }, [element]);
  return size;
}

/** One picture on its surround: fitted, or at 100% with panning; swiping leads to its neighbours. Give it a `key` a picture. */
export function Stage({ picture, alt, mark, over, onSwipe, onFull, onFailed, onShown, ref }: Props) {
  const stage = useRef<HTMLDivElement>(null);
  const size = useSize(stage);
  const large = derivativeSize(picture);
  const fitted = fitInto(large, size, window.devicePixelRatio);
  const full = fullScale(large, fitted, window.devicePixelRatio);
  const { view, drift, isFull, toggle, fit, pan, handlers } = useStage({ stage, fitted, full, onSwipe });
  const [sharp, setSharp] = useState(false);

  useImperativeHandle(ref, () => ({ toggle: () => toggle(), fit, pan }));
  useEffect(() => onFull(isFull), [isFull, onFull]);

  const placeholder = thumbhashAddress(picture.placeholder);
  const layer = 'absolute inset-0 size-full select-none';
  return (
    <div
      ref={stage}
      {...handlers}
      className={joinClasses('absolute inset-0 overflow-hidden', isFull ? 'cursor-grab touch-none active:cursor-grabbing' : 'touch-pan-y')}
    >
      <div
        data-stage-picture
        className="absolute top-1/2 left-1/2 bg-line bg-cover"
        style={{
          width: fitted.width * view.scale,
          height: fitted.height * view.scale,
          transform: `translate(-50%, -50%) translate(${view.x + drift}px, ${view.y}px)`,
          ...(placeholder ? { backgroundImage: `url(${placeholder})` } : {}),
        }}
      >
        {picture.medium ? <img src={picture.medium} alt={alt} draggable={false} className={layer} onError={onFailed} /> : null}
        {picture.large ? (
          <img
            src={picture.large}
            alt=""
            draggable={false}
            className={joinClasses(layer, !sharp && 'opacity-0')}
            onLoad={() => {
              setSharp(true);
              onShown();
            }}
            onError={onFailed}
          />
        ) : null}
        {over}
        {mark && !isFull ? <div className="pointer-events-none absolute top-0 left-1/2 -translate-x-1/2">{mark}</div> : null}
      </div>
    </div>
  );
}

/** The pixels of the large derivative, from the picture's own. */
function derivativeSize(picture: StagePicture): Size {
  const width = derivativeWidth(picture, LARGE);
  return { width, height: (width * picture.height) / Math.max(picture.width, 1) };
}
