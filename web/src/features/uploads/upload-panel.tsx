import { useId, useState } from 'react';
import type { FoundFile } from '../../lib/uploads/found-file.ts';
import type { UploadTotals } from '../../lib/uploads/totals.ts';
import type { UploadQueue } from '../../lib/uploads/upload-queue.ts';
import { Button } from '../../ui/button.tsx';
import { ConfirmDialog } from '../../ui/confirm-dialog.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { ProgressBar } from '../../ui/progress-bar.tsx';
import { FileChoosers } from './file-choosers.tsx';
import { useDrop } from './use-drop.ts';
import { useUploadTotals } from './use-uploads.ts';
import { UploadList } from './upload-list.tsx';
import { counted, countWords, headline, type Noun } from './upload-words.ts';

interface Props {
  queue: UploadQueue;
  noun: Noun;
}

/** Where files come in: drop them anywhere on the page, or choose them; with the progress of those that are on their way. */
export function UploadPanel({ queue, noun }: Props) {
  const totals = useUploadTotals(queue);
  const [listed, setListed] = useState(false);
  const listId = useId();
  const add = (files: FoundFile[]) => queue.add(files);
  const over = useDrop(add, (sentence) => showNotice(sentence, { tone: 'problem' }));
  const some = totals.files + totals.counts['left-out'] > 0;
  return (
    <section
      aria-label="Upload"
      className={`border border-dashed border-ink px-4 py-3.5 ${over ? 'bg-hair outline-2 outline-offset-2 outline-ink' : 'bg-sheet'}`}
    >
      {over ? <p className="pb-3 font-bold">Let go to upload.</p> : null}
      {some ? (
        <Progress queue={queue} totals={totals} noun={noun} onFound={add} />
      ) : (
        <div className="flex flex-wrap items-center justify-between gap-x-4 gap-y-2">
          <p>
            <b>Drop {noun.many} or a whole folder here</b>
            <span className="text-mute"> · JPEG, TIFF, PNG, WebP, AVIF, DNG and other raw files</span>
          </p>
          <div className="flex gap-2">
            <FileChoosers words={`Add ${noun.many}`} onFound={add} />
          </div>
        </div>
      )}
      {some ? <Notes queue={queue} totals={totals} noun={noun} listed={listed} listId={listId} onList={() => setListed(!listed)} /> : null}
      <div id={listId}>{some && listed ? <UploadList queue={queue} /> : null}</div>
    </section>
  );
}

function Progress({ queue, totals, noun, onFound }: Props & { totals: UploadTotals; onFound: (files: FoundFile[]) => void }) {
  const counts = countWords(totals);
  const label = headline(totals, noun);
  const choosers = <FileChoosers words={`Add ${noun.many}`} onFound={onFound} />;
  if (!totals.running && !totals.paused) {
    return (
      <div className="flex flex-wrap items-center justify-between gap-x-4 gap-y-2">
        <p>
          <b>{label}</b>
          {counts === '' ? null : <span className="text-mute"> · {counts}</span>}
        </p>
        <div className="flex gap-2">{choosers}</div>
      </div>
    );
  }
  return (
    <ProgressBar
      label={label}
      part={totals.bytes > 0 ? totals.sent / totals.bytes : 1}
      counts={counts === '' ? null : counts}
      bytes={totals.bytes > 0 ? { done: totals.sent, total: totals.bytes } : undefined}
      speed={totals.perSecond}
      secondsLeft={totals.running && totals.secondsLeft ? totals.secondsLeft : undefined}
      actions={
        <>
          {totals.paused ? (
            <Button size="small" tone="first" onClick={() => queue.resume()}>
              Continue
            </Button>
          ) : (
            <Button size="small" onClick={() => queue.pause()}>
              Pause
            </Button>
          )}
          {choosers}
        </>
      }
    />
  );
}

interface NotesProps extends Props {
  totals: UploadTotals;
  listed: boolean;
  listId: string;
  onList: () => void;
}

/** Below the bar: what stands in the way, and what can be done about it. */
function Notes({ queue, totals, noun, listed, listId, onList }: NotesProps) {
  const { counts, problem } = totals;
  const finished = counts.done + counts.known + counts['left-out'];
  return (
    <div className="mt-3 flex flex-wrap items-center gap-x-4 gap-y-2">
      <p role="status" className="font-bold text-copper empty:hidden">
        {problem}
      </p>
      {counts.held > 0 ? <Held queue={queue} count={counts.held} noun={noun} /> : null}
      <span className="flex flex-wrap gap-2">
        <Button size="small" tone="quiet" aria-expanded={listed} aria-controls={listId} onClick={onList}>
          {listed ? 'Hide the files' : 'Show the files'}
        </Button>
        {problem !== undefined && !totals.paused ? (
          <Button size="small" onClick={() => queue.tryNow()}>
            Try now
          </Button>
        ) : null}
        {counts.failed > 0 ? (
          <Button size="small" onClick={() => queue.retryFailed()}>
            Try {counts.failed === 1 ? 'the failed one' : `all ${counts.failed} failed`} again
          </Button>
        ) : null}
        {finished > 0 && !totals.running ? (
          <Button size="small" tone="quiet" onClick={() => queue.clearFinished()}>
            Clear the finished
          </Button>
        ) : null}
        <GiveUp queue={queue} totals={totals} noun={noun} />
      </span>
    </div>
  );
}

function Held({ queue, count, noun }: Props & { count: number }) {
  return (
    <p className="flex flex-wrap items-center gap-2">
      <span>
        {counted(count, noun)} of an earlier visit {count === 1 ? 'waits' : 'wait'}: continue, or choose the same files again. Parts that
        are there are not sent twice.
      </span>
      <Button size="small" tone="first" onClick={() => void goOn(queue)}>
        Continue
      </Button>
    </p>
  );
}

async function goOn(queue: UploadQueue): Promise<void> {
  await queue.continueHeld();
  queue.store.flush();
  if (queue.store.totals().counts.held === 0) return;
  showNotice('The browser cannot open the files by itself. Choose the same files or the same folder again.', { tone: 'problem' });
}

/** Gives everything unfinished up, after asking. */
function GiveUp({ queue, totals, noun }: Props & { totals: UploadTotals }) {
  const [asking, setAsking] = useState(false);
  const { counts } = totals;
  const open = totals.files - counts.done - counts.known;
  if (open === 0) return null;
  return (
    <>
      <Button size="small" tone="quiet" onClick={() => setAsking(true)}>
        {open === counts.failed ? 'Clear the failed' : 'Give up the rest'}
      </Button>
      <ConfirmDialog
        open={asking}
        title={`Give up ${counted(open, noun)}?`}
        confirm={`Give up ${counted(open, noun)}`}
        onClose={() => setAsking(false)}
        onConfirm={() => {
          queue.cancelAll();
          setAsking(false);
        }}
      >
        <p>What is not yet in the commission is taken out of the list, and parts that were sent are thrown away. Your own files stay.</p>
      </ConfirmDialog>
    </>
  );
}
