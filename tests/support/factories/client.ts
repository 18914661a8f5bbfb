import { Client } from '../../../api/models/Client.ts';
import { Contact } from '../../../api/models/Contact.ts';

let counter = 0;

/** A client of a studio with one contact. */
export async function makeClient(
  studio: { id: string },
  values: Partial<Pick<Client, 'name' | 'remarks' | 'deletedAt'>> & {
    contact?: Partial<Pick<Contact, 'name' | 'email' | 'position' | 'telephone'>>;
  } = {},
): Promise<Client & { contacts: Contact[] }> {
  counter += 1;
  const { contact, ...columns } = values;
  const client = await Client.query().insertAndFetch({ studioId: studio.id, name: `Tarn Brandreth Architects ${counter}`, ...columns });
  const made = await Contact.query().insertAndFetch({
    studioId: studio.id,
    clientId: client.id,
    name: 'Oskar Lind',
    email: `contact-${counter}@tarn-brandreth.test`,
    ...contact,
  });
  return Object.assign(client, { contacts: [made] });
}
