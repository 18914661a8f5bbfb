import type { ReactNode } from 'react';
import { formatBytes, formatTimeLeft } from '../lib/bytes.ts';

interface Props {
  /** What is being done, read out with the bar: "Uploading 184 frames". */
  label: string;
  /** 0 to 1; null while it cannot be told. */
  part: number | null;
  /** "114 done", "3 waiting to retry": the counts in words. */
  counts?: ReactNode;
  bytes?: { done: number; total: number } | undefined;
  /** Bytes a second. */
  speed?: number | undefined;
  secondsLeft?: number | null | undefined;
  /** Buttons at the right: pause, add … */
  actions?: ReactNode;
}

/** Long work as a line: what, how many, how much, how long still. */
export function ProgressBar({ label, part, counts, bytes, speed, secondsLeft, actions }: Props) {
  const details = [
    bytes ? `${formatBytes(bytes.done)} of ${formatBytes(bytes.total)}` : '',
    speed ? `${formatBytes(speed)}/s` : '',
    formatTimeLeft(secondsLeft ?? null),
  ].filter(Boolean);
  return (
    <div>
      <div className="flex flex-wrap items-center justify-between gap-x-4 gap-y-2">
        <p>
          <b>{label}</b>
          <span className="text-mute">
            {counts ? <> · {counts}</> : null}
            {details.map((detail) => ` · ${detail}`)}
          </span>
        </p>
        {actions ? <div className="flex gap-2">{actions}</div> : null}
      </div>
      <div
        role="progressbar"
        aria-label={label}
        aria-valuemin={0}
        aria-valuemax={100}
        {...(part === null ? {} : { 'aria-valuenow': Math.round(part * 100) })}
        className="mt-3 h-1.5 bg-hair"
      >
        <div className="h-full bg-ink" style={{ width: part === null ? '100%' : `${part * 100}%`, opacity: part === null ? 0.35 : 1 }} />
      </div>
    </div>
  );
}
