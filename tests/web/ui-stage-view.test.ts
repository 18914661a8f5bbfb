import { describe, expect, it } from 'vitest';
import { fitInto, FITTED, fullScale, keepOnStage, pinch, scaleAt, swipeOf } from '../../web/src/features/viewer/stage-view.ts';

const stage = { width: 1000, height: 800 };
const picture = { width: 2560, height: 1707 };

describe('a picture on the stage', () => {
  it('fits in with its own proportion', () => {
    const fitted = fitInto(picture, stage, 1);
    expect(fitted.width).toBeCloseTo(1000);
    expect(fitted.height).toBeCloseTo(666.8, 1);
    expect(fitInto({ width: 1707, height: 2560 }, stage, 1).height).toBeCloseTo(800);
  });

  it('is never blown up beyond its own pixels, on a dense screen neither', () => {
    expect(fitInto({ width: 400, height: 300 }, stage, 1)).toEqual({ width: 400, height: 300 });
    expect(fitInto({ width: 400, height: 300 }, stage, 2)).toEqual({ width: 200, height: 150 });
  });

  it('is full where one of its pixels is one of the screen', () => {
    expect(fullScale(picture, fitInto(picture, stage, 1), 1)).toBeCloseTo(2.56);
    expect(fullScale(picture, fitInto(picture, stage, 2), 2)).toBeCloseTo(1.28);
    expect(fullScale({ width: 400, height: 300 }, { width: 400, height: 300 }, 1)).toBe(1);
  });

  it('keeps what lies under the pointer under it while it is scaled', () => {
    const point = { x: 200, y: -100 };
    const scaled = scaleAt(FITTED, 2, point);
    // The place of the picture under the pointer, in fitted pixels from its middle, is the same before and after.
    expect((point.x - scaled.x) / 2).toBeCloseTo(200);
    expect((point.y - scaled.y) / 2).toBeCloseTo(-100);
  });

  it('never leaves the stage, nor goes beyond full or below fitted', () => {
    const fitted = fitInto(picture, stage, 1);
    expect(keepOnStage({ scale: 2, x: 9999, y: 9999 }, fitted, stage, 2.56)).toMatchObject({ scale: 2, x: 500 });
    expect(keepOnStage({ scale: 9, x: 0, y: 0 }, fitted, stage, 2.56).scale).toBe(2.56);
    expect(keepOnStage({ scale: 0.2, x: 50, y: 50 }, fitted, stage, 2.56)).toEqual(FITTED);
  });

  it('follows two fingers: their spread scales, their middle carries', () => {
    const wider = pinch(
      FITTED,
      [
        { x: -50, y: 0 },
        { x: 50, y: 0 },
      ],
      [
        { x: -100, y: 0 },
        { x: 100, y: 0 },
      ],
    );
    expect(wider).toEqual({ scale: 2, x: 0, y: 0 });
    const carried = pinch(
      FITTED,
      [
        { x: -50, y: 0 },
        { x: 50, y: 0 },
      ],
      [
        { x: -20, y: 10 },
        { x: 80, y: 10 },
      ],
    );
    expect(carried).toEqual({ scale: 1, x: 30, y: 10 });
  });

  it('reads a way across as a swipe, and a way down as none', () => {
    expect(swipeOf({ x: -120, y: 20 }, 390)).toBe('next');
    expect(swipeOf({ x: 120, y: -20 }, 390)).toBe('previous');
    expect(swipeOf({ x: -40, y: 0 }, 390)).toBeNull();
    expect(swipeOf({ x: -120, y: 110 }, 390)).toBeNull();
  });
});
