import { describe, expect, it } from 'vitest';
import type { UploadTotals } from '../../web/src/lib/uploads/totals.ts';
import { counted, countWords, headline } from '../../web/src/features/uploads/upload-words.ts';

const FRAME = { one: 'frame', many: 'frames' };
const NONE: UploadTotals['counts'] = {
  held: 0,
  waiting: 0,
  reading: 0,
  sending: 0,
  retrying: 0,
  checking: 0,
  done: 0,
  known: 0,
  failed: 0,
  'left-out': 0,
};

function totals(counts: Partial<UploadTotals['counts']>, more: Partial<UploadTotals> = {}): UploadTotals {
  const all = { ...NONE, ...counts };
  const files = Object.entries(all).reduce((sum, [state, count]) => sum + (state === 'left-out' ? 0 : count), 0);
  return {
    counts: all,
    files,
    bytes: 0,
    sent: 0,
    perSecond: undefined,
    secondsLeft: undefined,
    running: false,
    paused: false,
    problem: undefined,
    ...more,
  };
}

describe('the words of the upload panel', () => {
  it('count in words, thousands kept apart', () => {
    expect([counted(0, FRAME), counted(1, FRAME), counted(1204, FRAME)]).toEqual(['0 frames', '1 frame', '1\u2009204 frames']);
  });

  it('say what happens while it happens', () => {
    const now = totals({ done: 114, sending: 4, waiting: 63, retrying: 3 }, { running: true });
    expect(headline(now, FRAME)).toBe('Uploading 184 frames');
    expect(countWords(now)).toBe('114 done · 3 waiting to retry');
    expect(headline(totals({ checking: 2, done: 9 }, { running: true }), FRAME)).toBe('Checking 2 frames');
    expect(headline(totals({ sending: 2 }, { paused: true }), FRAME)).toBe('Upload paused');
  });

  it('say what came of it', () => {
    const over = totals({ done: 180, known: 2, failed: 2, 'left-out': 5 });
    expect([headline(over, FRAME), countWords(over)]).toEqual(['180 frames uploaded', '2 already there · 2 failed · 5 left out']);
    expect(headline(totals({ failed: 1 }), FRAME)).toBe('1 frame not uploaded');
    expect(headline(totals({ 'left-out': 3 }), FRAME)).toBe('Nothing to upload');
    expect(headline(totals({ held: 12 }), FRAME)).toBe('12 frames from an earlier visit unfinished');
  });
});
