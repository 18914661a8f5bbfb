import { describe, expect, it } from 'vitest';
import { formatAperture, formatBias, formatFocalLength, formatIso, formatShot, formatShutter } from '../../api/domain/photo-notation.ts';

describe('photographers’ notation (common practice)', () => {
  it.each([
    [11, 'f/11'],
    [5.6, 'f/5.6'],
    [5.656854, 'f/5.6'],
    [11.3137, 'f/11'],
    [22.6274, 'f/22'],
    [1.4142, 'f/1.4'],
    [1.8, 'f/1.8'],
    [5.08, 'f/5.1'],
    [9.4, 'f/9.4'],
    [0.95, 'f/0.95'],
    [2, 'f/2'],
    [0, null],
    [NaN, null],
    [null, null],
  ])('aperture %s is %s', (value, text) => {
    expect(formatAperture(value)).toBe(text);
  });

  it.each([
    [1 / 125, '1/125 s'],
    [1 / 128, '1/125 s'],
    [0.001, '1/1000 s'],
    [1 / 1024, '1/1000 s'],
    [1 / 64, '1/60 s'],
    [0.016949152542, '1/59 s'],
    [1 / 1205, '1/1205 s'],
    [10 / 2134, '1/213 s'],
    [1 / 8000, '1/8000 s'],
    [1 / 16000, '1/16000 s'],
    [0.25, '1/4 s'],
    [1 / 3, '1/3 s'],
    [0.3, '1/3 s'],
    [0.4, '0.4 s'],
    [0.5, '0.5 s'],
    [1, '1 s'],
    [1.3, '1.3 s'],
    [2.5, '2.5 s'],
    [30, '30 s'],
    [128, '128 s'],
    [0, null],
    [-1, null],
  ])('shutter %d s is %s', (value, text) => {
    expect(formatShutter(value)).toBe(text);
  });

  it('knows what stands for an unknown sensitivity (65535, CIPA DC-008, from memory)', () => {
    expect(formatIso(100)).toBe('ISO 100');
    expect(formatIso(65535)).toBeNull();
    expect(formatIso(0)).toBeNull();
  });

  it('gives the equivalent where it differs', () => {
    expect(formatFocalLength(35)).toBe('35 mm');
    expect(formatFocalLength(4.25)).toBe('4.3 mm');
    expect(formatFocalLength(24, 36)).toBe('24 mm (36 mm)');
    expect(formatFocalLength(35, 35)).toBe('35 mm');
    expect(formatFocalLength(0)).toBeNull();
  });

  it.each([
    [0, '±0 EV'],
    [0.33, '+1/3 EV'],
    [0.3, '+1/3 EV'],
    [-0.7, '−2/3 EV'],
    [0.65, '+2/3 EV'],
    [-1, '−1 EV'],
    [1.5, '+1 1/2 EV'],
    [2, '+2 EV'],
    [1.3264, '+1 1/3 EV'],
    [0.15, '+0.15 EV'],
    [-165191049.8, null],
    [null, null],
  ])('bias %s is %s', (value, text) => {
    expect(formatBias(value)).toBe(text);
  });

  it('joins what is known', () => {
    expect(formatShot({ fNumber: 11, seconds: 1 / 125, iso: 100, focalLength: 35 })).toBe('f/11 · 1/125 s · ISO 100 · 35 mm');
    expect(formatShot({ fNumber: null, seconds: 2.5 })).toBe('2.5 s');
  });
});
