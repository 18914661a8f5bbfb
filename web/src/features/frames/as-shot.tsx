import type { ReactNode } from 'react';
import type { Frame } from '../../../../api/contract/frames.ts';
import { formatAperture, formatBias, formatFocalLength, formatIso, formatShutter } from '../../../../api/domain/photo-notation.ts';
import { formatBytes } from '../../lib/bytes.ts';
import { formatTime } from '../../lib/dates.ts';
import { stepWords } from './bracket-words.ts';
import { formatLocalTime } from './local-time.ts';

const MODES = ['Automatic', 'By hand', 'Automatic bracket'];
const UNKNOWN = 'not recorded';

/** The settings with which a frame was taken, and its file. Of the settings everybody looks for, a missing one says so. */
export function AsShot({ frame }: { frame: Frame }) {
  return (
    <div className="grid gap-x-8 md:grid-cols-2 lg:grid-cols-1">
      <Facts title="As shot">
        <Fact label="In its bracket" value={stepFact(frame.step)} />
        <Fact always label="Aperture" value={formatAperture(frame.fNumber)} />
        <Fact always label="Shutter" value={formatShutter(frame.exposureTime)} />
        <Fact always label="ISO" value={formatIso(frame.iso)?.replace('ISO ', '')} />
        <Fact always label="Focal length" value={formatFocalLength(frame.focalLength, frame.focalLength35)} />
        <Fact always label="Taken" value={taken(frame)} />
        <Fact label="Exposure bias" value={formatBias(frame.exposureBias)} />
        <Fact label="Exposure" value={frame.exposureMode === null ? null : MODES[frame.exposureMode]} />
        <Fact label="Camera" value={[frame.make, frame.model].filter(Boolean).join(' ') || null} />
        <Fact label="Lens" value={frame.lens} />
        <Fact label="Serial number" value={frame.serial} />
        <Fact label="Place" value={place(frame)} />
      </Facts>
      <Facts title="File">
        <Fact label="Name" value={frame.originalName} />
        <Fact label="Pixels" value={frame.width > 0 ? `${frame.width} × ${frame.height}` : null} />
        <Fact label="Size" value={formatBytes(frame.size)} />
        <Fact label="Type" value={frame.mediaType} />
        <Fact label="Uploaded" value={formatTime(frame.createdAt)} />
        <Fact label="SHA-256" value={frame.sha256} />
      </Facts>
    </div>
  );
}

function Facts({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section className="mb-6 border-t border-ink pt-2">
      <h2 className="lettering">{title}</h2>
      <dl>{children}</dl>
    </section>
  );
}

function Fact({ label, value, always }: { label: string; value: string | null | undefined; always?: boolean }) {
  if (!value && !always) return null;
  return (
    <div className="flex justify-between gap-4 border-b border-hair py-1.5">
      <dt className="shrink-0">{label}</dt>
      <dd className={`min-w-0 text-right break-words ${value ? '' : 'text-mute'}`}>{value ?? UNKNOWN}</dd>
    </div>
  );
}

function stepFact(step: number | null): string | null {
  if (step === null) return null;
  return step === 0 ? 'the lead frame' : `${stepWords(step)} ${Math.abs(step) > 1 ? 'stops' : 'stop'}`;
}

/** The camera's wall clock, with its zone where the camera wrote one. */
function taken({ takenLocal, takenOffsetMinutes }: Frame): string | null {
  if (takenLocal === null) return null;
  return [formatLocalTime(takenLocal), takenOffsetMinutes === null ? '' : offset(takenOffsetMinutes)].join(' ').trim();
}

function offset(minutes: number): string {
  const size = Math.abs(minutes);
  const clock = [Math.floor(size / 60), size % 60].map((part) => String(part).padStart(2, '0')).join(':');
  return `UTC${minutes < 0 ? '−' : '+'}${clock}`;
}

function place({ latitude, longitude }: Frame): string | null {
  if (latitude === null || longitude === null) return null;
  const side = (degrees: number, positive: string, negative: string) =>
    `${Math.abs(degrees).toFixed(4)}° ${degrees < 0 ? negative : positive}`;
  return `${side(latitude, 'N', 'S')}, ${side(longitude, 'E', 'W')}`;
}
