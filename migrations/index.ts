import type { Knex } from 'knex';
import * as accounts from './20261201100000_accounts.ts';
import * as commissions from './20261201101000_commissions.ts';
import * as frames from './20261201102000_frames.ts';
import * as sheets from './20261201103000_sheets.ts';
import * as pickLists from './20261201104000_pick_lists.ts';
import * as deliveries from './20261201105000_deliveries.ts';
import * as mailsAndRecord from './20261201110000_mails_and_record.ts';
import * as workerBeats from './20261201111000_worker_beats.ts';
import * as links from './20261201112000_links.ts';
import * as versionsOfViewsAndContacts from './20261201112000_versions_of_views_and_contacts.ts';
import * as downloadsCovered from './20261201113000_downloads_covered.ts';
import * as brackets from './20261201120000_brackets.ts';
import * as measures from './20261201121000_measures.ts';
import * as checksAndUses from './20261201122000_checks_and_uses.ts';
import * as openLinks from './20261201130000_open_links.ts';

/** Every migration in the order it runs. Names carry no file ending, so that they stay the same however the code is run. */
const migrations: Record<string, Knex.Migration> = {
  '20261201100000_accounts': accounts,
  '20261201101000_commissions': commissions,
  '20261201102000_frames': frames,
  '20261201103000_sheets': sheets,
  '20261201104000_pick_lists': pickLists,
  '20261201105000_deliveries': deliveries,
  '20261201110000_mails_and_record': mailsAndRecord,
  '20261201111000_worker_beats': workerBeats,
  '20261201112000_links': links,
  '20261201112000_versions_of_views_and_contacts': versionsOfViewsAndContacts,
  '20261201113000_downloads_covered': downloadsCovered,
  '20261201120000_brackets': brackets,
  '20261201121000_measures': measures,
  '20261201122000_checks_and_uses': checksAndUses,
  '20261201130000_open_links': openLinks,
};

export const migrationSource: Knex.MigrationSource<string> = {
  getMigrations: async () => Object.keys(migrations).sort(),
  getMigrationName: (name) => name,
  getMigration: async (name) => {
    const migration = migrations[name];
    if (!migration) throw new Error(`There is no migration ${name}.`);
    return migration;
  },
};
