import type { FrameSummary } from '../../../../api/contract/frames.ts';
import { Button } from '../../ui/button.tsx';
import { Select } from '../../ui/select.tsx';
import { TextInput } from '../../ui/text-input.tsx';
import type { FrameWish, Shown, SortBy } from './frame-order.ts';

const SORTS: { value: SortBy; words: string }[] = [
  { value: 'taken', words: 'Sort: time taken' },
  { value: 'name', words: 'Sort: name' },
  { value: 'f-number', words: 'Sort: aperture' },
  { value: 'exposure-time', words: 'Sort: shutter' },
  { value: 'iso', words: 'Sort: ISO' },
  { value: 'focal-length', words: 'Sort: focal length' },
];

interface Props {
  summary: FrameSummary | undefined;
  wish: FrameWish;
  onWish: (wish: Partial<FrameWish>) => void;
  views: ReadonlyMap<string, { title: string; number: number }>;
  /** How many frames are shown now, and how many of them are chosen. */
  shown: number;
  chosen: number;
  onAll: () => void;
}

/** Above the grid: which frames, in which order. */
export function FrameToolbar({ summary, wish, onWish, views, shown, chosen, onAll }: Props) {
  return (
    <div className="flex flex-wrap items-center justify-between gap-x-4 gap-y-2">
      <div className="flex flex-wrap items-center gap-2">
        <ShownButtons summary={summary} shown={wish.shown} onShown={(value) => onWish({ shown: value })} />
        <Select
          aria-label="View"
          scale="small"
          className="w-40 lg:w-52"
          value={wish.view}
          choices={viewChoices(views)}
          onChange={(event) => onWish({ view: event.target.value })}
        />
        <TextInput
          type="search"
          aria-label="Filter by name, settings or time"
          placeholder="Name, f/8, 17:06"
          className="h-8! w-44! text-13 lg:w-52!"
          value={wish.text}
          onChange={(event) => onWish({ text: event.target.value })}
        />
      </div>
      <div className="flex flex-wrap items-center gap-2">
        <Select
          aria-label="Sort by"
          scale="small"
          value={wish.sort}
          choices={SORTS}
          onChange={(event) => onWish({ sort: event.target.value as SortBy })}
        />
        <Button size="small" aria-pressed={wish.descending} onClick={() => onWish({ descending: !wish.descending })}>
          {wish.descending ? 'Descending' : 'Ascending'}
        </Button>
        <Button size="small" disabled={shown === 0 || chosen === shown} onClick={onAll}>
          Choose all
        </Button>
      </div>
    </div>
  );
}

/** An entry appears with what it shows; the one in use stays. */
function ShownButtons({ summary, shown, onShown }: { summary: FrameSummary | undefined; shown: Shown; onShown: (shown: Shown) => void }) {
  const counts: Record<Shown, number> = {
    visible: (summary?.total ?? 0) - (summary?.hidden ?? 0),
    hidden: summary?.hidden ?? 0,
    failed: summary?.failed ?? 0,
    deleted: summary?.deleted ?? 0,
  };
  const words: Record<Shown, string> = { visible: 'Frames', hidden: 'Hidden', failed: 'Failed', deleted: 'Deleted' };
  const entries = (Object.keys(words) as Shown[]).filter((one) => one === 'visible' || one === shown || counts[one] > 0);
  return entries.map((one) => (
    <Button key={one} size="small" tone={one === shown ? 'first' : 'plain'} aria-pressed={one === shown} onClick={() => onShown(one)}>
      {words[one]} {summary ? counts[one] : ''}
    </Button>
  ));
}

function viewChoices(views: Props['views']) {
  const named = [...views].map(([value, { title, number }]) => ({ value, words: `View ${number} · ${title}` }));
  return [{ value: '', words: 'All views' }, { value: 'none', words: 'Under no view' }, ...named];
}
