/** What a proof of a bracket is made of: "5 exposures merged", "4 of 5 exposures merged" where one was left out, "1 of 5 exposures". */
export function sayExposures(count: number, { merged, leftOut }: { merged: boolean; leftOut: number }): string {
  if (!merged) return `1 of ${count} exposures`;
  return leftOut === 0 ? `${count} exposures merged` : `${count - leftOut} of ${count} exposures merged`;
}
