import type { Job } from '../../jobs/job.ts';
import { Client } from '../../models/Client.ts';
import { Commission } from '../../models/Commission.ts';

/** Removes clients that were deleted more than 30 days ago, with their contacts. */
export const purgeClients: Job = {
  name: 'purge-clients',
  every: '20 3 * * *',
  async run(ctx) {
    const before = new Date(Date.now() - 30 * 24 * 60 * 60 * 1000);
    const commissions = Commission.query().select(1).whereColumn('commissions.clientId', 'clients.id');
    await Client.query(ctx.knex).delete().where('deletedAt', '<', before).whereNotExists(commissions);
  },
};
