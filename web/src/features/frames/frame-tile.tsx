import { memo, type MouseEvent } from 'react';
import { Link } from 'react-router-dom';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import { Picture } from '../../ui/picture.tsx';
import { captionSettings, captionShutter, stem } from './frame-words.ts';
import { CAPTION } from './grid-rows.ts';

interface Props {
  frame: FrameItem;
  width: number;
  height: number;
  chosen: boolean;
  /** The one tile that Tab comes to. */
  reachable: boolean;
  /** The title of the view it hangs under, and that view's number in the brief. */
  view: { title: string; number: number } | undefined;
  /** In a bracket: how many stops it is brighter than the lead, in words, and whether the merged picture is made without it. */
  step?: string | undefined;
  leftOut?: boolean;
  /** Below the picture: everything that somebody should look at. */
  sentences?: boolean;
  /** Where the frame is shown large. */
  address: string;
  onPress: (id: string, event: MouseEvent) => void;
  onMark: (id: string) => void;
  onOpen: (id: string) => void;
}

/** One frame in the grid: its picture, its name and settings, and a box that chooses it without the keyboard. */
export const FrameTile = memo(function FrameTile(props: Props) {
  const { frame, width, height, chosen, reachable, step, address } = props;
  return (
    <div
      role="gridcell"
      aria-selected={chosen}
      tabIndex={reachable ? 0 : -1}
      data-frame={frame.id}
      className="group relative block h-full shrink-0 select-none"
      style={{ width }}
      onClick={(event) => props.onPress(frame.id, event)}
      onDoubleClick={() => props.onOpen(frame.id)}
    >
      <div className={`relative ${chosen ? 'outline-3 outline-ink' : ''}`} style={{ width, height }}>
        <TilePicture frame={frame} width={width} />
        <Box chosen={chosen} onMark={() => props.onMark(frame.id)} />
      </div>
      <p className="flex items-center gap-2 text-13 text-mute" style={{ height: CAPTION }}>
        <span className="min-w-0 flex-1 truncate" title={frame.name}>
          <Link to={address} tabIndex={-1} className="font-bold text-ink hover:underline" onClick={(event) => event.stopPropagation()}>
            {step === undefined ? stem(frame.name) : step}
            {step === undefined ? null : <span className="sr-only"> {stem(frame.name)}</span>}
          </Link>{' '}
          {step === undefined ? captionSettings(frame) : null}
        </span>
        {step === undefined ? <Remark {...props} /> : <BracketRemark {...props} />}
      </p>
      {props.sentences ? <Sentences frame={frame} /> : null}
    </div>
  );
});

function TilePicture({ frame, width }: { frame: FrameItem; width: number }) {
  if (frame.state === 'failed') {
    return (
      <span className="flex size-full flex-col justify-center border border-copper bg-sheet p-3 text-13 text-copper">
        <b>Could not be read</b>
        <span className="line-clamp-4">{frame.problem}</span>
      </span>
    );
  }
  const source = {
    small: frame.pictures?.['480'],
    medium: frame.pictures?.['960'],
    width: frame.width || 3,
    height: frame.height || 2,
    thumbhash: frame.placeholder,
  };
  return (
    <>
      <Picture source={source} alt="" drawnWidth={width} className={`size-full ${frame.hidden ? 'opacity-40' : ''}`} />
      {frame.pictures ? null : <span className="absolute inset-0 flex items-center justify-center text-13 text-ink">Reading…</span>}
    </>
  );
}

/** For pointers only: the keyboard chooses with Space, and the cell itself says whether it is chosen. */
function Box({ chosen, onMark }: { chosen: boolean; onMark: () => void }) {
  return (
    <span
      aria-hidden="true"
      data-box=""
      className={`absolute top-0 left-0 p-1.5 pointer-coarse:p-2.5 ${chosen ? '' : 'opacity-0 group-hover:opacity-100 group-focus-visible:opacity-100 pointer-coarse:opacity-100'}`}
      onClick={(event) => {
        event.stopPropagation();
        onMark();
      }}
      onDoubleClick={(event) => event.stopPropagation()}
    >
      <span className={`flex size-6 items-center justify-center border border-ink font-bold ${chosen ? 'bg-ink text-sheet' : 'bg-sheet'}`}>
        {chosen ? '✓' : ''}
      </span>
    </span>
  );
}

function Remark({ frame, view, sentences }: Props) {
  if (frame.hidden) return <span className="font-bold">hidden</span>;
  const check = sentences ? undefined : frame.checks.find((one) => one.toCheck);
  return (
    <>
      {check ? <b className="shrink-0 text-copper">{check.short}</b> : null}
      {view ? (
        <span className="shrink-0" title={view.title}>
          View {view.number}
          <span className="sr-only">, {view.title}</span>
        </span>
      ) : null}
    </>
  );
}

const AT_THE_LIMIT = ['highlights', 'shadows'];

/** What is beside a frame's step: a frame of a bracket is clipped on purpose, which is worth reading and no alarm. */
function BracketRemark({ frame, leftOut }: Props) {
  if (leftOut) return <b className="text-copper">left out</b>;
  const check = frame.checks.find((one) => one.toCheck || AT_THE_LIMIT.includes(one.check));
  if (check) return <b className="truncate text-copper">{check.short}</b>;
  return <span>{captionShutter(frame)}</span>;
}

function Sentences({ frame }: { frame: FrameItem }) {
  return (
    <ul className="pb-3 text-13">
      {frame.checks
        .filter((check) => check.toCheck)
        .map((check) => (
          <li key={check.check} className="list-none">
            {check.says}
          </li>
        ))}
    </ul>
  );
}
