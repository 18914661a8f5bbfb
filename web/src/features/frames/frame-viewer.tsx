import { useQuery } from '@tanstack/react-query';
import { useEffect, useRef, type KeyboardEvent, type ReactNode } from 'react';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import { Button } from '../../ui/button.tsx';
import { NoticeRegion } from '../../ui/notices.tsx';
import { QueryView } from '../../ui/query-view.tsx';
import { SurroundMenu } from '../sheets-guest/surround-menu.tsx';
import { useSurround, type Surround } from '../sheets-guest/surround.ts';
import { AsShot } from './as-shot.tsx';
import { LargePicture, usePreloaded } from './large-picture.tsx';
import { frameQuery } from './queries.ts';

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
  onGo: (id: string) => void;
  onClose: () => void;
  /** What can be done with the frame. */
  children: ReactNode;
}

/** One frame over the whole window, with its settings at the side. Arrows go on, Escape goes back. */
export function FrameViewer({ frame, place, before, after, onGo, onClose, children }: Props) {
  const [surround, setSurround] = useSurround('viewer');
  const details = useQuery(frameQuery(frame.id));
  usePreloaded([useLarge(after), useLarge(before)]);
  const press = (event: KeyboardEvent) => {
    const next = event.key === 'ArrowRight' ? after : event.key === 'ArrowLeft' ? before : undefined;
    if (!next || event.altKey || event.ctrlKey || event.metaKey) return;
    event.preventDefault();
    onGo(next.id);
  };
  return (
    <FullWindow label={`Frame ${frame.name}`} onClose={onClose} onKeyDown={press} className={SURROUNDS[surround]}>
      <header className="flex flex-wrap items-center gap-2 px-4 py-3">
        <Button size="small" onClick={onClose}>
          ← All frames
        </Button>
        <h1 className="mr-auto truncate px-1 text-17 font-normal">
          <b>{frame.name}</b> · {place.at} of {place.of}
        </h1>
        <SurroundMenu surround={surround} onChoose={setSurround} />
        {children}
        <Step words="Previous" to={before} onGo={onGo} />
        <Step words="Next" to={after} onGo={onGo} />
      </header>
      <div className="grid min-h-0 flex-1 grid-rows-[minmax(0,3fr)_minmax(0,2fr)] lg:grid-cols-[minmax(0,1fr)_330px] lg:grid-rows-1">
        <div className="min-h-0 p-4 pt-1 lg:px-10 lg:pb-8">
          <LargePicture frame={frame} large={details.data?.pictures?.['2560']} />
        </div>
        <aside
          tabIndex={0}
          aria-label="Settings and file"
          className="overflow-y-auto border-t border-ink bg-paper p-5 text-ink lg:border-t-0 lg:border-l"
        >
          <QueryView query={details}>{(full) => <AsShot frame={full} />}</QueryView>
        </aside>
      </div>
      <NoticeRegion />
    </FullWindow>
  );
}

function useLarge(frame: FrameItem | undefined): string | undefined {
  const { data } = useQuery({ ...frameQuery(frame?.id ?? ''), enabled: frame?.state === 'ready' });
  return data?.pictures?.['2560'];
}

function Step({ words, to, onGo }: { words: string; to: FrameItem | undefined; onGo: (id: string) => void }) {
  return (
    <Button size="small" disabled={!to} onClick={() => to && onGo(to.id)}>
      {words}
    </Button>
  );
}

interface FullWindowProps {
  label: string;
  className: string;
  onClose: () => void;
  onKeyDown: (event: KeyboardEvent) => void;
  children: ReactNode;
}

/** The browser's modal dialog over the whole window: what lies below keeps its place and its selection. */
function FullWindow({ label, className, onClose, onKeyDown, children }: FullWindowProps) {
  const dialog = useRef<HTMLDialogElement>(null);
  useEffect(() => {
    const element = dialog.current;
    element?.showModal();
    // The first button would be lit up otherwise, as if it were to be pressed.
    element?.focus();
    return () => element?.close();
  }, []);
  return (
    <dialog
      ref={dialog}
      aria-label={label}
      tabIndex={-1}
      className={`m-0 h-dvh max-h-none w-dvw max-w-none border-0 p-0 open:flex open:flex-col ${className}`}
      onCancel={(event) => {
        // A file chooser or menu within tells of its own end in the same way.
        if (event.target !== dialog.current) return;
        event.preventDefault();
        onClose();
      }}
      onKeyDown={onKeyDown}
    >
      {children}
    </dialog>
  );
}
