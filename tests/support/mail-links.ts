import type { House } from './house.ts';

/** The newest mail to an address. @throws Error where none came */
export function newestMail(house: House, to: string) {
  const mail = house.mails.mails().findLast((each) => each.envelope.to.includes(to));
  if (!mail) throw new Error(`No mail came to ${to}.`);
  return mail;
}

/** The token of the link in the newest mail to an address: what stands after "/join/", "/open/" … */
export function tokenIn(house: House, to: string, page: 'open' | 'begin' | 'join' | 'reset-password' | 'confirm-email'): string {
  const token = new RegExp(`/${page}/([\\w-]+)`).exec(newestMail(house, to).text)?.[1];
  if (!token) throw new Error(`The newest mail to ${to} has no link to ${page}.`);
  return token;
}
