/** The exposure headroom, in stops, as a sentence. */
export function headroomWords(headroom: number): string {
  const stops = Number(headroom.toFixed(1));
  if (stops === 0) return 'The brightest parts are at the limit.';
  return `The brightest parts are ${stops} ${stops === 1 ? 'stop' : 'stops'} below the limit.`;
}
