import type { FrameSummary } from '../../../../api/contract/frames.ts';
import { Button } from '../../ui/button.tsx';
import { Select } from '../../ui/select.tsx';
import { TextInput } from '../../ui/text-input.tsx';
import type { FrameWish, SortBy } from './frame-order.ts';
import type { GroupCounts } from './sections.ts';

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
  /** Counted by what is loaded; null while more is on its way. */
  counts: GroupCounts | null;
  wish: FrameWish;
  onWish: (wish: Partial<FrameWish>) => void;
  views: ReadonlyMap<string, { title: string; number: number }>;
  /** How many frames are shown now, and how many of them are chosen. */
  shown: number;
  chosen: number;
  onAll: () => void;
}

/** Above the grid: which frames, in which order. */
export function FrameToolbar({ summary, counts, wish, onWish, views, shown, chosen, onAll }: Props) {
  return (
    <div className="grid gap-2">
      <div role="group" aria-label="Which frames" className="flex flex-wrap items-center gap-2">
        <GroupButtons summary={summary} counts={counts} wish={wish} onWish={onWish} />
      </div>
      <div className="flex flex-wrap items-center gap-2">
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
        <div className="flex gap-2 lg:ml-auto">
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
    </div>
  );
}

interface Entry extends Pick<FrameWish, 'shown' | 'group'> {
  words: string;
  count: (summary: FrameSummary) => number;
}

const ENTRIES: Entry[] = [
  { shown: 'visible', group: 'all', words: 'Frames', count: ({ total, hidden }) => total - hidden },
  { shown: 'visible', group: 'brackets', words: 'Brackets', count: ({ brackets }) => brackets },
  { shown: 'visible', group: 'single', words: 'Single frames', count: ({ brackets, single }) => (brackets > 0 ? single : 0) },
  { shown: 'visible', group: 'to-check', words: 'To check', count: ({ toCheck }) => toCheck },
  { shown: 'visible', group: 'alike', words: 'Alike', count: ({ alike }) => alike },
  { shown: 'hidden', group: 'all', words: 'Hidden', count: ({ hidden }) => hidden },
  { shown: 'failed', group: 'all', words: 'Failed', count: ({ failed }) => failed },
  { shown: 'deleted', group: 'all', words: 'Deleted', count: ({ deleted }) => deleted },
];

/** Where nothing is grouped, single frames are all of them. */
function countOf(counts: GroupCounts, group: keyof GroupCounts): number {
  return group === 'single' && counts.brackets === 0 ? 0 : counts[group];
}

/** An entry appears with what it shows; the first one and the one in use stay. */
function GroupButtons({ summary, counts, wish, onWish }: Pick<Props, 'summary' | 'counts' | 'wish' | 'onWish'>) {
  return ENTRIES.map(({ shown, group, words, count }, at) => {
    const inUse = shown === wish.shown && group === wish.group;
    const many = counts && group !== 'all' ? countOf(counts, group) : summary ? count(summary) : 0;
    if (at > 0 && !inUse && many === 0) return null;
    return (
      <Button key={words} size="small" tone={inUse ? 'first' : 'plain'} aria-pressed={inUse} onClick={() => onWish({ shown, group })}>
        {words} {summary ? many : ''}
      </Button>
    );
  });
}

function viewChoices(views: Props['views']) {
  const named = [...views].map(([value, { title, number }]) => ({ value, words: `View ${number} · ${title}` }));
  return [{ value: '', words: 'All views' }, { value: 'none', words: 'Under no view' }, ...named];
}
