import { useQuery } from '@tanstack/react-query';
import { useRef, useState, type KeyboardEvent, type ReactNode } from 'react';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import { Button } from '../../ui/button.tsx';
import { NoticeRegion } from '../../ui/notices.tsx';
import { SurroundMenu } from '../sheets-guest/surround-menu.tsx';
import { nextSurround, useSurround, type Surround } from '../sheets-guest/surround.ts';
import { GuideLines } from '../viewer/guide-lines.tsx';
import { GuidesMenu } from '../viewer/guides-menu.tsx';
import { nextGuides, useGuides } from '../viewer/guides.ts';
import { placesOf, stepIn, type BracketSet } from './bracket-places.ts';
import { BracketStrip } from './bracket-strip.tsx';
import { FramePanel } from './frame-panel.tsx';
import { FrameStage, type FrameStageHandle } from './frame-stage.tsx';
import { FullWindow } from './full-window.tsx';
import { KeysDialog, VIEWER_KEYS } from './keys-dialog.tsx';
import { usePreloaded } from './preloaded.ts';
import { frameQuery } from './queries.ts';
import { useBlink } from './use-blink.ts';
import { pressInViewer } from './use-frame-keys.ts';
import { useLayers } from './use-layers.ts';
import '../../messages/beyond-sheet.ts';

/** Words on each surround keep 4.5:1. */
const SURROUNDS: Record<Surround, string> = {
  paper: 'bg-paper text-ink',
  grey: 'bg-line text-ink',
  mid: 'bg-grey text-black',
  black: 'bg-black text-sheet',
};

interface Props {
  frame: FrameItem;
  /** Its place among those shown, from 1, and how many they are. */
  place: { at: number; of: number };
  before: FrameItem | undefined;
  after: FrameItem | undefined;
  /** The bracket it belongs to, and whether its merged picture is looked at. */
  set: BracketSet | null;
  merged: boolean;
  onGo: (id: string, merged?: boolean) => void;
  onClose: () => void;
  /** What can be done with the frame. */
  children: ReactNode;
}

/** One frame over the whole window, or its bracket's merged picture, with what is known of it at the side. */
export function FrameViewer({ frame, place, before, after, set, merged, onGo, onClose, children }: Props) {
  const [surround, setSurround] = useSurround('viewer');
  const [guides, setGuides] = useGuides();
  const [clipping, setClipping] = useState(false);
  const [isFull, setFull] = useState(false);
  const [asking, setAsking] = useState(false);
  const stage = useRef<FrameStageHandle>(null);
  const blink = useBlink(`${frame.id} ${String(merged)}`);
  const canBlink = set?.bracket.merged.state === 'ready';
  const { shown, ready } = useLayers(frame, set, merged !== (blink.other && canBlink));
  usePreloaded([useLarge(after), useLarge(before)]);
  const places = set ? placesOf(set) : [];
  const step = (by: 1 | -1) => {
    const to = stepIn(places, frame.id, merged, by);
    if (to) onGo(to.frameId, to.merged);
  };
  const goTo = (to: FrameItem | undefined) => to && onGo(to.id);
  const press = (event: KeyboardEvent) => {
    // A dialog that lies above has keys of its own.
    if (asking || (event.target as Element).closest('dialog') !== event.currentTarget) return;
    if (event.key.toLowerCase() === 'b' && canBlink && !event.repeat && !event.ctrlKey && !event.metaKey) return blink.hold(true);
    // Beside the picture they scroll what is longer than the window.
    if ((event.target as Element).closest('aside') && /^Arrow(Up|Down)$/.test(event.key)) return;
    pressInViewer(event, {
      previous: () => goTo(before),
      next: () => goTo(after),
      darker: () => step(-1),
      brighter: () => step(1),
      pan: (x, y) => stage.current?.pan(x, y),
      zoom: () => stage.current?.toggle(),
      clipping: () => setClipping(!clipping),
      guides: () => setGuides(nextGuides(guides)),
      surround: () => setSurround(nextSurround(surround)),
      help: () => setAsking(true),
    });
  };
  return (
    <FullWindow
      label={merged ? `Merged proof of ${frame.name}` : `Frame ${frame.name}`}
      onClose={onClose}
      onKeyDown={press}
      onKeyUp={(event) => event.key.toLowerCase() === 'b' && blink.hold(false)}
      className={SURROUNDS[surround]}
    >
      <header className="flex flex-wrap items-center gap-2 px-4 py-3">
        <Button size="small" onClick={onClose}>
          ← All frames
        </Button>
        <h1 className="mr-auto truncate px-1 text-17 font-normal">
          <b>{merged ? 'Merged proof' : frame.name}</b> · {place.at} of {place.of}
        </h1>
        <Button size="small" aria-pressed={clipping} tone={clipping ? 'first' : 'plain'} onClick={() => setClipping(!clipping)}>
          Clipping
        </Button>
        <Button size="small" aria-pressed={isFull} tone={isFull ? 'first' : 'plain'} onClick={() => stage.current?.toggle()}>
          100%
        </Button>
        <GuidesMenu guides={guides} onChoose={setGuides} />
        <SurroundMenu surround={surround} onChoose={setSurround} />
        {children}
        <Button size="small" onClick={() => setAsking(true)}>
          Keys
        </Button>
        <Button size="small" disabled={!before} onClick={() => goTo(before)}>
          Previous
        </Button>
        <Button size="small" disabled={!after} onClick={() => goTo(after)}>
          Next
        </Button>
      </header>
      <div className="grid min-h-0 flex-1 grid-rows-[minmax(0,3fr)_minmax(0,2fr)] lg:grid-cols-[minmax(0,1fr)_330px] lg:grid-rows-1">
        <div className="flex min-h-0 flex-col gap-3 p-4 pt-1 lg:px-10 lg:pb-6">
          <div className="relative min-h-0 flex-1">
            {frame.state === 'ready' ? (
              <FrameStage
                // How a picture lies is kept within a bracket, and begins anew with the next.
                key={set?.bracket.id ?? frame.id}
                ref={stage}
                size={{ width: frame.width || 3, height: frame.height || 2 }}
                shown={shown}
                ready={ready}
                clipping={clipping}
                over={<GuideLines guides={guides} />}
                onFull={setFull}
                onStep={(to) => goTo(to === 'next' ? after : before)}
              />
            ) : (
              <Instead frame={frame} />
            )}
          </div>
          {set ? (
            <BracketStrip places={places} frameId={frame.id} merged={merged} onGo={onGo} blink={canBlink ? blink : undefined} />
          ) : null}
        </div>
        <FramePanel frame={frame} set={set} merged={merged} />
      </div>
      <KeysDialog title="Keys of this view" keys={VIEWER_KEYS} open={asking} onClose={() => setAsking(false)} />
      <NoticeRegion />
    </FullWindow>
  );
}

function useLarge(frame: FrameItem | undefined): string | undefined {
  const { data } = useQuery({ ...frameQuery(frame?.id ?? ''), enabled: frame?.state === 'ready' });
  return data?.pictures?.['2560'];
}

function Instead({ frame }: { frame: FrameItem }) {
  return (
    <p className="absolute inset-0 grid place-items-center bg-sheet p-6 text-center text-ink">
      {frame.state === 'failed' ? `${frame.name} could not be read. ${frame.problem ?? ''}` : 'This frame is being read.'}
    </p>
  );
}
