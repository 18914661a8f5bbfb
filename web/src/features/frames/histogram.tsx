import type { ShownMeasures } from '../../../../api/contract/frames.ts';
import { headroomWords } from '../../../../api/domain/headroom.ts';
import { shareWords } from './clipping-hatch.ts';
import { HEIGHT, pointsOf, topOf, WIDTH } from './histogram-lines.ts';

/** Colour beside a picture would colour the eye, so the channels are told apart by their strokes. */
const CHANNELS = [
  { key: 'red', words: 'red', dashes: '' },
  { key: 'green', words: 'green', dashes: '4 2' },
  { key: 'blue', words: 'blue', dashes: '1 2' },
] as const;

/** How much of the picture is how bright, from black to white, and what is at the ends. */
export function Histogram({ measures: { histogram, highlights, shadows, headroom } }: { measures: ShownMeasures }) {
  const top = topOf([histogram.luma, histogram.red, histogram.green, histogram.blue]);
  // The words of the figures below, for those who cannot see the drawing.
  const says = `Histogram. ${headroomWords(headroom)} Highlights at the limit: ${shareWords(highlights.any)} in any channel, ${shareWords(highlights.all)} in all. Shadows at the limit: ${shareWords(shadows.all)}.`;
  return (
    <>
      <svg
        viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
        preserveAspectRatio="none"
        role="img"
        aria-label={says}
        className="mt-2 block h-24 w-full border border-line bg-sheet"
      >
        <polygon points={`0,${HEIGHT} ${pointsOf(histogram.luma, top)} ${WIDTH},${HEIGHT}`} className="fill-line" />
        {CHANNELS.map(({ key, dashes }) => (
          <polyline
            key={key}
            points={pointsOf(histogram[key], top)}
            strokeDasharray={dashes}
            vectorEffect="non-scaling-stroke"
            className="fill-none stroke-ink"
          />
        ))}
      </svg>
      <ul className="flex gap-4 pt-1 text-13 text-mute">
        {CHANNELS.map(({ key, words, dashes }) => (
          <li key={key} className="flex list-none items-center gap-1.5">
            <svg width="20" height="2" aria-hidden="true">
              <line x2="20" y1="1" y2="1" strokeDasharray={dashes} className="stroke-ink" />
            </svg>
            {words}
          </li>
        ))}
      </ul>
      <dl className="pt-1">
        <Line label="Headroom" value={headroom < 0.05 ? 'none' : `${headroom.toFixed(1)} stops`} />
        <Line label="Highlights at the limit" value={`${shareWords(highlights.any)}, ${shareWords(highlights.all)} in all channels`} />
        <Line label="Shadows at the limit" value={shareWords(shadows.all)} />
      </dl>
    </>
  );
}

function Line({ label, value }: { label: string; value: string }) {
  return (
    <div className="flex justify-between gap-4 border-b border-hair py-1.5">
      <dt className="shrink-0">{label}</dt>
      <dd className="min-w-0 text-right">{value}</dd>
    </div>
  );
}
