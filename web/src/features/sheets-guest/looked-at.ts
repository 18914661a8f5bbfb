/** The proof of each sheet that was last looked at on its own page, so that the sheet shows where one was. */
const lastLooked = new Map<string, number>();

export function noteLookedAt(sheetId: string, number: number): void {
  lastLooked.set(sheetId, number);
}

/** The number of that proof, until it is forgotten. */
export function lookedAt(sheetId: string): number | undefined {
  return lastLooked.get(sheetId);
}

/** Called once the sheet has shown it: a sheet that is opened anew begins at its top. */
export function forgetLookedAt(sheetId: string): void {
  lastLooked.delete(sheetId);
}
