import type { Knex } from 'knex'

/** Society, people and their sessions, outgoing mail, the job outbox, worker heartbeats and the audit trail. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create function refuse_change() returns trigger language plpgsql as $$
    begin
      raise exception 'rows of % are never changed or removed', tg_table_name
        using errcode = 'restrict_violation', constraint = tg_table_name || '_append_only', table = tg_table_name;
    end
    $$;

    create table society (
      only_row boolean not null default true,
      name text not null,
      currency text not null,
      currency_digits smallint not null,
      time_zone text not null,
      created_at timestamptz not null default now(),
      constraint society_pkey primary key (only_row),
      constraint society_only_row_check check (only_row),
      constraint society_name_check check (name <> ''),
      constraint society_currency_check check (currency ~ '^[A-Z]{3}$'),
      constraint society_currency_digits_check check (currency_digits between 0 and 4)
    );
    insert into society (name, currency, currency_digits, time_zone) values ('Licensing society', 'EUR', 2, 'UTC');

    create table users (
      id uuid not null default gen_random_uuid(),
      email text not null,
      name text not null,
      role text not null,
      status text not null,
      password_hash text,
      created_at timestamptz not null default now(),
      last_sign_in_at timestamptz,
      constraint users_pkey primary key (id),
      constraint users_email_key unique (email),
      constraint users_email_lower_check check (email = lower(email) and email like '%_@_%'),
      constraint users_name_check check (name <> ''),
      constraint users_role_check check (role in ('uploader', 'clerk', 'publisher', 'auditor', 'admin')),
      constraint users_status_check check (status in ('invited', 'active', 'disabled')),
      constraint users_password_check check (status <> 'active' or password_hash is not null)
    );

    create table sessions (
      id uuid not null default gen_random_uuid(),
      user_id uuid not null,
      user_agent text not null default '',
      created_at timestamptz not null default now(),
      last_used_at timestamptz not null default now(),
      expires_at timestamptz not null,
      ended_at timestamptz,
      end_reason text,
      constraint sessions_pkey primary key (id),
      constraint sessions_user_fkey foreign key (user_id) references users (id) on delete cascade,
      constraint sessions_expiry_check check (expires_at > created_at),
      constraint sessions_end_check check ((ended_at is null) = (end_reason is null)),
      constraint sessions_end_reason_check check (end_reason in (
        'signed-out', 'ended-by-user', 'signed-out-everywhere', 'password-changed', 'password-reset',
        'access-changed', 'refresh-reused'
      ))
    );
    create index sessions_user_idx on sessions (user_id);

    create table refresh_tokens (
      id uuid not null default gen_random_uuid(),
      session_id uuid not null,
      token_hash bytea not null,
      created_at timestamptz not null default now(),
      expires_at timestamptz not null,
      rotated_at timestamptz,
      replaced_by uuid,
      constraint refresh_tokens_pkey primary key (id),
      constraint refresh_tokens_hash_key unique (token_hash),
      constraint refresh_tokens_hash_check check (octet_length(token_hash) = 32),
      constraint refresh_tokens_session_fkey foreign key (session_id) references sessions (id) on delete cascade,
      constraint refresh_tokens_replaced_by_fkey foreign key (replaced_by) references refresh_tokens (id)
        on delete set null,
      constraint refresh_tokens_rotation_check check (replaced_by is null or rotated_at is not null)
    );
    create index refresh_tokens_session_idx on refresh_tokens (session_id);
    create index refresh_tokens_replaced_by_idx on refresh_tokens (replaced_by);

    create table account_tokens (
      id uuid not null default gen_random_uuid(),
      user_id uuid not null,
      kind text not null,
      token_hash bytea not null,
      created_at timestamptz not null default now(),
      expires_at timestamptz not null,
      used_at timestamptz,
      constraint account_tokens_pkey primary key (id),
      constraint account_tokens_hash_key unique (token_hash),
      constraint account_tokens_hash_check check (octet_length(token_hash) = 32),
      constraint account_tokens_kind_check check (kind in ('invitation', 'password-reset')),
      constraint account_tokens_user_fkey foreign key (user_id) references users (id) on delete cascade
    );
    create index account_tokens_user_idx on account_tokens (user_id);

    create table mail_messages (
      id uuid not null default gen_random_uuid(),
      recipient text not null,
      subject text not null,
      body text not null,
      created_at timestamptz not null default now(),
      sent_at timestamptz,
      constraint mail_messages_pkey primary key (id),
      constraint mail_messages_recipient_check check (recipient like '%_@_%' and recipient !~ '[\\r\\n]'),
      constraint mail_messages_subject_check check (subject <> '' and subject !~ '[\\r\\n]')
    );
    create index mail_messages_created_idx on mail_messages (created_at desc, id);

    create table jobs (
      id uuid not null default gen_random_uuid(),
      kind text not null,
      payload jsonb not null,
      status text not null default 'waiting',
      attempts integer not null default 0,
      dedupe_key text not null,
      run_after timestamptz not null default now(),
      queued_at timestamptz,
      error_message text,
      worker_name text,
      heartbeat_at timestamptz,
      created_at timestamptz not null default now(),
      started_at timestamptz,
      finished_at timestamptz,
      constraint jobs_pkey primary key (id),
      constraint jobs_dedupe_key unique (dedupe_key),
      constraint jobs_kind_check check (kind ~ '^[a-z][a-z-]*$'),
      constraint jobs_payload_check check (jsonb_typeof(payload) = 'object'),
      constraint jobs_status_check check (status in ('waiting', 'running', 'done', 'failed')),
      constraint jobs_attempts_check check (attempts >= 0),
      constraint jobs_running_check check (status <> 'running' or (heartbeat_at is not null and started_at is not null)),
      constraint jobs_finished_check check ((status in ('done', 'failed')) = (finished_at is not null)),
      constraint jobs_failed_check check (status <> 'failed' or error_message is not null)
    );
    create index jobs_waiting_idx on jobs (run_after, created_at) where status = 'waiting';
    create index jobs_running_idx on jobs (heartbeat_at) where status = 'running';
    create index jobs_finished_idx on jobs (finished_at, kind) where finished_at is not null;

    create table worker_heartbeats (
      name text not null,
      started_at timestamptz not null default now(),
      last_seen_at timestamptz not null default now(),
      index_recordings integer not null default 0,
      index_bytes bigint not null default 0,
      constraint worker_heartbeats_pkey primary key (name),
      constraint worker_heartbeats_index_check check (index_recordings >= 0 and index_bytes >= 0)
    );

    create table audit_events (
      id bigint not null generated always as identity,
      at timestamptz not null default now(),
      actor_user_id uuid,
      actor_name text not null,
      action text not null,
      subject_kind text not null,
      subject_id text not null,
      summary text not null,
      constraint audit_events_pkey primary key (id),
      constraint audit_events_actor_fkey foreign key (actor_user_id) references users (id),
      constraint audit_events_action_check check (action ~ '^[a-z][a-z-]*$'),
      constraint audit_events_subject_check check (subject_kind <> '' and subject_id <> ''),
      constraint audit_events_summary_check check (summary <> '')
    );
    create index audit_events_actor_idx on audit_events (actor_user_id);
    create index audit_events_subject_idx on audit_events (subject_kind, subject_id, id desc);
    create trigger audit_events_append_only before update or delete on audit_events
      for each row execute function refuse_change();
    create trigger audit_events_no_truncate before truncate on audit_events
      for each statement execute function refuse_change();
  `)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop table audit_events, worker_heartbeats, jobs, mail_messages, account_tokens, refresh_tokens, sessions,
      users, society;
    drop function refuse_change();
  `)
}
