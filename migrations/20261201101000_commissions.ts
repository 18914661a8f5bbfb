import type { Knex } from 'knex';

/** Clients with their contacts; commissions with the views the brief asks for. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table clients (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null references studios on delete cascade,
      name text not null check (length(name) between 1 and 160),
      remarks text not null default '',
      version integer not null default 1,
      created_at timestamptz not null default now(),
      deleted_at timestamptz,
      unique (studio_id, id)
    );
    create index clients_by_name on clients (studio_id, lower(name), id);

    create table contacts (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null references studios on delete cascade,
      client_id uuid not null,
      name text not null check (length(name) between 1 and 120),
      email text not null check (email = lower(email)),
      position text not null default '',
      telephone text not null default '',
      created_at timestamptz not null default now(),
      unique (studio_id, id),
      unique (client_id, email),
      foreign key (studio_id, client_id) references clients (studio_id, id) on delete cascade
    );

    create table commissions (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null references studios on delete cascade,
      client_id uuid not null,
      title text not null check (length(title) between 1 and 200),
      brief text not null default '',
      shot_on date,
      due_on date,
      allowance integer not null default 0 check (allowance between 0 and 10000),
      extra_price bigint not null default 0 check (extra_price between 0 and 100000000000),
      currency char(3) not null check (currency ~ '^[A-Z]{3}$'),
      closed_at timestamptz,
      deleted_at timestamptz,
      version integer not null default 1,
      created_at timestamptz not null default now(),
      updated_at timestamptz not null default now(),
      unique (studio_id, id),
      foreign key (studio_id, client_id) references clients (studio_id, id)
    );
    create index commissions_newest on commissions (studio_id, created_at desc, id);
    create index commissions_by_due on commissions (studio_id, due_on, id);
    create index commissions_by_title on commissions (studio_id, lower(title), id);
    create index commissions_client on commissions (studio_id, client_id);

    create table views (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      commission_id uuid not null,
      position integer not null,
      title text not null check (length(title) between 1 and 200),
      asked_for text not null default '',
      created_at timestamptz not null default now(),
      unique (studio_id, id),
      foreign key (studio_id, commission_id) references commissions (studio_id, id) on delete cascade
    );
    create index views_in_order on views (commission_id, position, id);
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('drop table views, commissions, contacts, clients');
}
