import type { OpenLinkTerms } from '../../../api/contract/open-links.ts';
import type { House } from '../house.ts';
import type { MadeStudio } from './studio.ts';

/** Switches the open link of a sheet on as its studio does; gives the token of its address. */
export async function switchOn(made: MadeStudio, sheetId: string, terms: OpenLinkTerms = {}): Promise<string> {
  const { body } = await made.assistant.agent.post(`/api/sheets/${sheetId}/open-link`).send(terms).expect(200);
  return (body.openLink.address as string).split('/look/')[1] ?? '';
}

/** Somebody at a browser of their own who looks by an open link. */
export async function makeLooker(house: House, token: string, passphrase?: string): Promise<ReturnType<House['agent']>> {
  const agent = house.agent();
  const { body } = await agent.post('/api/look').send({ token, passphrase }).expect(200);
  if (!body.goTo) throw new Error('The link asks for its passphrase.');
  return agent;
}
