/** Where to go after signing in: the page that was asked for, where it is one of ours; the desk otherwise. */
export function nextAddress(search: string): string {
  const asked = new URLSearchParams(search).get('next') ?? '';
  // "//host" and "/\host" are addresses elsewhere.
  return /^\/(?![/\\])/.test(asked) ? asked : '/desk';
}

/** The sign-in page that leads back to a page of ours. */
export function signInAddress(from: { pathname: string; search: string }): string {
  return from.pathname === '/desk' ? '/sign-in' : `/sign-in?next=${encodeURIComponent(from.pathname + from.search)}`;
}
