import { describe, expect, it } from 'vitest';
import { shotFacts } from '../../web/src/features/viewer/as-shot.ts';

const asShot = { fNumber: 11, exposureTime: 2, iso: 100, focalLength: 35, takenLocal: null, shutterRange: null, apart: null };
const bracket = { ...asShot, shutterRange: { fastest: 1 / 8, slowest: 30 }, apart: '2 stops apart' };
const said = (shot: Parameters<typeof shotFacts>[0]) =>
  Object.fromEntries(shotFacts(shot, (fastest, slowest) => `${fastest} to ${slowest}`).map(({ fact, says }) => [fact, says]));

// The expected words are a photographer's notation, common practice: f/11, 1/8 s, 2 s, ISO 100, 35 mm.
describe('how a proof was shot', () => {
  it('tells the settings of a single frame', () => {
    expect(said({ asShot, exposures: null })).toEqual({ aperture: 'f/11', shutter: '2 s', iso: '100', focalLength: '35 mm' });
  });

  it('tells how many exposures were merged, how far apart, and from which shutter time to which', () => {
    const exposures = { count: 5, merged: true, says: '5 exposures merged' };
    expect(said({ asShot: bracket, exposures })).toMatchObject({ exposures: '5, 2 stops apart, merged', shutter: '1/8 s to 30 s' });
    const fewer = { count: 5, merged: true, says: '4 of 5 exposures merged' };
    expect(said({ asShot: { ...bracket, apart: null }, exposures: fewer }).exposures).toBe('4 of 5, merged');
  });

  it('tells the time of the frame itself where the lead is shown, or all were as long', () => {
    const lead = { count: 5, merged: false, says: '1 of 5 exposures' };
    expect(said({ asShot: bracket, exposures: lead })).toMatchObject({ exposures: '1 of 5, 2 stops apart', shutter: '2 s' });
    const even = { ...bracket, shutterRange: { fastest: 2, slowest: 2 } };
    expect(said({ asShot: even, exposures: { count: 3, merged: true, says: '3 exposures merged' } }).shutter).toBe('2 s');
  });

  it('leaves out what the camera did not write', () => {
    const nothing = { fNumber: null, exposureTime: null, iso: null, focalLength: 0, takenLocal: null, shutterRange: null, apart: null };
    expect(said({ asShot: nothing, exposures: null })).toEqual({});
  });
});
