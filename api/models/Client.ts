import { Model } from 'objection';
import { Contact } from './Contact.ts';
import { StudioRow } from './StudioRow.ts';

export class Client extends StudioRow {
  static override tableName = 'clients';
  static override get relationMappings() {
    return {
      contacts: { relation: Model.HasManyRelation, modelClass: Contact, join: { from: 'clients.id', to: 'contacts.clientId' } },
    };
  }

  declare name: string;
  declare remarks: string;
  declare version: number;
  declare createdAt: Date;
  declare deletedAt: Date | null;
  declare contacts?: Contact[];
}
