import { describe, expect, it } from 'vitest';
import {
  apertureValue,
  exposureValue,
  exposureValue100,
  fNumberFromAperture,
  secondsFromTime,
  speedValue,
  timeValue,
} from '../../api/domain/exposure.ts';

// Formulas: ExifTool's Exif.pm; the APEX annex of CIPA DC-008 (from memory). Nominal rows follow from them.
describe('APEX values', () => {
  it.each([
    [1, 0],
    [1.4, 0.9709],
    [2, 2],
    [2.8, 2.9709],
    [4, 4],
    [5.6, 4.9709],
    [8, 6],
    [11, 6.9189],
    [16, 8],
    [22, 8.9189],
    [32, 10],
  ])('Av of f/%d is %d', (n, av) => {
    expect(apertureValue(n)).toBeCloseTo(av, 4);
  });

  it.each([
    [1, 1.4142],
    [3, 2.8284],
    [5, 5.6569],
    [7, 11.3137],
    [9, 22.6274],
  ])('Av %d is f/%d exactly', (av, n) => {
    expect(fNumberFromAperture(av)).toBeCloseTo(n, 4);
  });

  it.each([
    [30, -4.9069],
    [8, -3],
    [1, 0],
    [1 / 15, 3.9069],
    [1 / 60, 5.9069],
    [1 / 125, 6.9658],
    [1 / 1000, 9.9658],
    [1 / 4, 2],
  ])('Tv of %d s is %d', (seconds, tv) => {
    expect(timeValue(seconds)).toBeCloseTo(tv, 4);
  });

  it.each([
    [25, 3],
    [50, 4],
    [64, 4.3561],
    [80, 4.6781],
    [100, 5],
    [125, 5.3219],
    [160, 5.6781],
    [250, 6.3219],
    [320, 6.6781],
    [400, 7],
    [6400, 11],
    [102400, 15],
  ])('Sv of ISO %d is %d', (iso, sv) => {
    expect(speedValue(iso)).toBeCloseTo(sv, 4);
  });
});

describe('exposure value (rows recomputed with ExifTool 12.57, Composite:LightValue)', () => {
  it.each([
    [16, 1 / 125, 100, 14.9658, 14.9658],
    [16, 1 / 100, 100, 14.6439, 14.6439],
    [11, 1 / 250, 100, 14.8846, 14.8846],
    [8, 1 / 125, 100, 12.9658, 12.9658],
    [5.6, 1 / 60, 100, 10.8777, 10.8777],
    [2.8, 1 / 30, 400, 7.8777, 5.8777],
    [8, 30, 100, 1.0931, 1.0931],
    [8, 4, 100, 4, 4],
    [1.4, 1 / 15, 1600, 4.8777, 0.8777],
    [4, 1 / 4000, 100, 15.9658, 15.9658],
    [1, 1, 100, 0, 0],
    [2.8, 1 / 50, 3200, 8.6147, 3.6147],
    [16, 30, 50, 3.0931, 4.0931],
    [8, 1 / 60, 800, 11.9069, 8.9069],
  ])('f/%d, %d s, ISO %d: EV %d, EV100 %d', (fNumber, seconds, iso, ev, ev100) => {
    expect(exposureValue({ fNumber, seconds })).toBeCloseTo(ev, 4);
    expect(exposureValue100({ fNumber, seconds, iso })).toBeCloseTo(ev100, 4);
  });

  it.each([
    ['ExifTool sample, 4 s f/14 ISO 100', 14, 4, 100, 5.6147],
    ['ExifTool sample, 10/2134 s f/9.4 ISO 100', 9.4, 10 / 2134, 100, 14.2027],
    ['ExifTool sample, 1/250 s f/16 ISO 80', 16, 1 / 250, 80, 16.2877],
    ['ExifTool sample, 0.00051 s f/2 ISO 50', 2, 0.00051, 50, 13.9372],
    ['ExifTool sample, 1/20 s f/1.8 ISO 40', 1.8, 1 / 20, 40, 7.3399],
  ])('%s', (_name, fNumber, seconds, iso, ev100) => {
    expect(exposureValue100({ fNumber, seconds, iso })).toBeCloseTo(ev100, 3);
  });

  it('follows the published whole steps (f/4 at 1/16 s is EV 8: t = N²/2^EV)', () => {
    expect(exposureValue({ fNumber: 4, seconds: 1 / 16 })).toBe(8);
    expect(exposureValue({ fNumber: 8, seconds: 64 })).toBe(0);
  });
});

describe('values no camera can mean', () => {
  it('are not taken for a shutter time (−2147483648 in a real file)', () => {
    expect(secondsFromTime(-2147483648)).toBeNull();
    expect(secondsFromTime(NaN)).toBeNull();
    expect(secondsFromTime(7)).toBe(1 / 128);
  });

  it('give no exposure value', () => {
    expect(exposureValue({ fNumber: 0, seconds: 1 })).toBeNull();
    expect(exposureValue({ fNumber: 8, seconds: null })).toBeNull();
    expect(exposureValue100({ fNumber: 8, seconds: 1, iso: null })).toBeNull();
  });
});
