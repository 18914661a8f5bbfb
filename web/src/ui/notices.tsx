import { useSyncExternalStore } from 'react';
import { useTranslation } from 'react-i18next';
import { Button } from './button.tsx';

export interface Notice {
  id: number;
  words: string;
  /** problem: something did not work; it stays until it is dismissed. */
  tone: 'plain' | 'problem';
  undo?: () => void;
}

const SHOWN_FOR = 8_000;
const SHOWN_FOR_WITH_UNDO = 12_000;

let notices: Notice[] = [];
let nextId = 1;
const hearers = new Set<() => void>();

function replace(next: Notice[]): void {
  notices = next;
  hearers.forEach((hear) => hear());
}

/** Takes a notice away before its time. */
export function dismissNotice(id: number): void {
  replace(notices.filter((notice) => notice.id !== id));
}

/**
 * Shows a sentence in the corner and has it read out. With `undo` it carries a button and stays for 12 s, else for 8 s;
 * a problem stays until it is dismissed. At most three are shown, the oldest goes first.
 */
export function showNotice(words: string, options: { tone?: Notice['tone']; undo?: () => void } = {}): number {
  const notice: Notice = { id: nextId++, words, tone: options.tone ?? 'plain', ...(options.undo ? { undo: options.undo } : {}) };
  replace([...notices.filter((other) => other.words !== words), notice].slice(-3));
  if (notice.tone === 'plain') setTimeout(() => dismissNotice(notice.id), notice.undo ? SHOWN_FOR_WITH_UNDO : SHOWN_FOR);
  return notice.id;
}

function listen(hear: () => void): () => void {
  hearers.add(hear);
  return () => hearers.delete(hear);
}

function NoticeRow({ notice }: { notice: Notice }) {
  const { t } = useTranslation();
  return (
    <div className={`flex items-center gap-3 border bg-sheet px-4 py-2 ${notice.tone === 'problem' ? 'border-copper' : 'border-ink'}`}>
      <p className="flex-1">{notice.words}</p>
      {notice.undo ? (
        <Button
          size="small"
          onClick={() => {
            notice.undo?.();
            dismissNotice(notice.id);
          }}
        >
          {t('ui.undo')}
        </Button>
      ) : null}
      <Button size="small" tone="quiet" onClick={() => dismissNotice(notice.id)}>
        {t('ui.dismiss')}
      </Button>
    </div>
  );
}

/** The one place where notices appear; it is always there, so that screen readers notice what comes into it. */
export function NoticeRegion() {
  const { t } = useTranslation();
  const shown = useSyncExternalStore(listen, () => notices);
  return (
    <div
      role="region"
      aria-label={t('ui.notices')}
      className="fixed right-4 bottom-4 left-4 in-[body:has([data-foot])]:bottom-20 z-40 grid gap-2 md:left-auto md:w-96"
      aria-live="polite"
    >
      {shown.map((notice) => (
        <NoticeRow key={notice.id} notice={notice} />
      ))}
    </div>
  );
}
