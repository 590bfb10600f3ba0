import type { Knex } from 'knex'

/** Rules, monthly distributions with every level of their sums, statements, disputes. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table distribution_rules (
      version text not null,
      valid_from date not null,
      minimum_ms bigint not null,
      cap_ms bigint,
      -- How long after the issue a statement may be questioned.
      question_days smallint not null default 90,
      created_at timestamptz not null default now(),
      constraint distribution_rules_pkey primary key (version),
      constraint distribution_rules_valid_from_key unique (valid_from),
      constraint distribution_rules_minimum_check check (minimum_ms >= 0),
      constraint distribution_rules_cap_check check (cap_ms >= greatest(minimum_ms, 1)),
      constraint distribution_rules_question_check check (question_days > 0)
    );

    create table deduction_rules (
      rules_version text not null,
      position smallint not null,
      code text not null,
      label text not null,
      rate_ppm integer not null,
      constraint deduction_rules_pkey primary key (rules_version, position),
      constraint deduction_rules_code_key unique (rules_version, code),
      constraint deduction_rules_version_fkey foreign key (rules_version) references distribution_rules (version),
      constraint deduction_rules_rate_check check (rate_ppm between 0 and 1000000),
      constraint deduction_rules_label_check check (label <> '')
    );
    insert into distribution_rules (version, valid_from, minimum_ms, cap_ms) values ('1', '2000-01-01', 5000, null);

    create table distribution_months (
      month date not null,
      status text not null default 'open',
      constraint distribution_months_pkey primary key (month),
      constraint distribution_months_first_day_check check (extract(day from month) = 1),
      constraint distribution_months_status_check check (
        status in ('open', 'calculating', 'calculated', 'approved', 'issuing', 'issued')
      )
    );

    create table distributions (
      id uuid not null default gen_random_uuid(),
      month date not null,
      run integer not null,
      rules_version text not null,
      status text not null default 'calculating',
      failure text,
      currency text not null,
      currency_digits smallint not null,
      digest text,
      fee_minor bigint,
      net_minor bigint,
      allocated_minor bigint,
      held_back_minor bigint,
      plays integer,
      requested_by uuid not null,
      requested_at timestamptz not null default now(),
      calculated_at timestamptz,
      approved_by uuid,
      approved_at timestamptz,
      issued_by uuid,
      issued_at timestamptz,
      constraint distributions_pkey primary key (id),
      constraint distributions_run_key unique (month, run),
      constraint distributions_month_fkey foreign key (month) references distribution_months (month),
      constraint distributions_rules_fkey foreign key (rules_version) references distribution_rules (version),
      constraint distributions_requested_by_fkey foreign key (requested_by) references users (id),
      constraint distributions_approved_by_fkey foreign key (approved_by) references users (id),
      constraint distributions_issued_by_fkey foreign key (issued_by) references users (id),
      constraint distributions_status_check check (
        status in ('calculating', 'calculated', 'failed', 'approved', 'issuing', 'issued', 'withdrawn')
      ),
      constraint distributions_failure_check check ((status = 'failed') = (failure is not null)),
      constraint distributions_result_check check (
        status in ('calculating', 'failed', 'withdrawn')
        or num_nulls(digest, fee_minor, net_minor, allocated_minor, held_back_minor, plays, calculated_at) = 0
      ),
      constraint distributions_closed_check check (net_minor = allocated_minor + held_back_minor),
      -- Four eyes: who calculated a month never approves it.
      constraint distributions_four_eyes_check check (approved_by <> requested_by),
      constraint distributions_approval_check check (
        (approved_by is null) = (approved_at is null)
        and (status not in ('approved', 'issuing', 'issued') or approved_by is not null)
      ),
      constraint distributions_issue_check check ((status = 'issued') = (issued_at is not null))
    );
    create unique index distributions_issued_once on distributions (month) where issued_at is not null;
    create unique index distributions_one_live_run on distributions (month)
      where status not in ('failed', 'withdrawn');
    create index distributions_rules_idx on distributions (rules_version);
    create index distributions_requested_by_idx on distributions (requested_by);
    create index distributions_approved_by_idx on distributions (approved_by);
    create index distributions_issued_by_idx on distributions (issued_by);

    create function refuse_issued_distribution() returns trigger language plpgsql as $$
    begin
      if old.issued_at is not null then
        raise exception 'an issued distribution is never changed or removed'
          using errcode = 'restrict_violation', constraint = 'distributions_issued_unchanged', table = 'distributions';
      end if;
      return case when tg_op = 'DELETE' then old else new end;
    end
    $$;
    create trigger distributions_issued_unchanged before update or delete on distributions
      for each row execute function refuse_issued_distribution();

    -- Plays of a month that is being or has been calculated stand still, or the sums would not be theirs.
    create function refuse_play_in_closed_month() returns trigger language plpgsql as $$
    declare
      affected date := date_trunc('month', case when tg_op = 'DELETE' then old.local_day else new.local_day end);
      current_status text;
    begin
      select status into current_status from distribution_months where month = affected for share;
      if current_status is not null and current_status <> 'open' then
        raise exception 'plays of % cannot change: the month is %', to_char(affected, 'YYYY-MM'), current_status
          using errcode = 'restrict_violation', constraint = 'plays_month_open', table = 'plays';
      end if;
      return case when tg_op = 'DELETE' then old else new end;
    end
    $$;
    create trigger plays_month_open before insert or update or delete on plays
      for each row execute function refuse_play_in_closed_month();

    create table distribution_stations (
      distribution_id uuid not null,
      station_id uuid not null,
      held_ms bigint not null,
      expected_ms bigint not null,
      covered_days smallint not null,
      fee_minor bigint not null,
      net_minor bigint not null,
      constraint distribution_stations_pkey primary key (distribution_id, station_id),
      constraint distribution_stations_distribution_fkey foreign key (distribution_id) references distributions (id),
      constraint distribution_stations_station_fkey foreign key (station_id) references stations (id),
      constraint distribution_stations_amounts_check check (fee_minor >= net_minor and net_minor >= 0)
    );
    create index distribution_stations_station_idx on distribution_stations (station_id);

    create table distribution_deductions (
      distribution_id uuid not null,
      station_id uuid not null,
      position smallint not null,
      code text not null,
      label text not null,
      rate_ppm integer not null,
      amount_minor bigint not null,
      constraint distribution_deductions_pkey primary key (distribution_id, station_id, position),
      constraint distribution_deductions_station_fkey foreign key (distribution_id, station_id)
        references distribution_stations (distribution_id, station_id),
      constraint distribution_deductions_amount_check check (amount_minor >= 0)
    );

    create table distribution_pools (
      distribution_id uuid not null,
      station_id uuid not null,
      "right" text not null,
      pool_minor bigint not null,
      plays integer not null,
      credited_ms bigint not null,
      allocated_minor bigint not null,
      held_back_minor bigint not null,
      constraint distribution_pools_pkey primary key (distribution_id, station_id, "right"),
      constraint distribution_pools_station_fkey foreign key (distribution_id, station_id)
        references distribution_stations (distribution_id, station_id),
      constraint distribution_pools_right_check check ("right" in ('works', 'recordings')),
      constraint distribution_pools_closed_check check (pool_minor = allocated_minor + held_back_minor)
    );

    create table distribution_holdbacks (
      id uuid not null default gen_random_uuid(),
      distribution_id uuid not null,
      station_id uuid not null,
      "right" text not null,
      work_id uuid,
      recording_id uuid,
      subject text not null,
      reason_code text not null,
      reason text not null,
      amount_minor bigint not null,
      constraint distribution_holdbacks_pkey primary key (id),
      constraint distribution_holdbacks_pool_fkey foreign key (distribution_id, station_id, "right")
        references distribution_pools (distribution_id, station_id, "right"),
      constraint distribution_holdbacks_work_fkey foreign key (work_id) references works (id),
      constraint distribution_holdbacks_recording_fkey foreign key (recording_id) references recordings (id),
      constraint distribution_holdbacks_amount_check check (amount_minor >= 0),
      constraint distribution_holdbacks_reason_check check (reason <> '' and reason_code ~ '^[a-z][a-z-]*$')
    );
    create index distribution_holdbacks_pool_idx on distribution_holdbacks (distribution_id, station_id, "right");
    create index distribution_holdbacks_work_idx on distribution_holdbacks (work_id);
    create index distribution_holdbacks_recording_idx on distribution_holdbacks (recording_id);

    -- Names and codes are copied: a statement must read the same after the catalogue was corrected.
    create table statements (
      id uuid not null default gen_random_uuid(),
      distribution_id uuid not null,
      party_id uuid not null,
      party_name text not null,
      party_ipi text,
      number text not null,
      gross_minor bigint not null,
      net_minor bigint not null,
      constraint statements_pkey primary key (id),
      constraint statements_party_key unique (distribution_id, party_id),
      constraint statements_number_key unique (distribution_id, number),
      constraint statements_distribution_fkey foreign key (distribution_id) references distributions (id),
      constraint statements_party_fkey foreign key (party_id) references parties (id),
      constraint statements_amounts_check check (gross_minor >= net_minor and net_minor >= 0)
    );
    create index statements_party_idx on statements (party_id);

    create table statement_stations (
      statement_id uuid not null,
      station_id uuid not null,
      gross_minor bigint not null,
      deductions_minor bigint not null,
      net_minor bigint not null,
      held_ms bigint not null,
      expected_ms bigint not null,
      constraint statement_stations_pkey primary key (statement_id, station_id),
      constraint statement_stations_statement_fkey foreign key (statement_id) references statements (id),
      constraint statement_stations_station_fkey foreign key (station_id) references stations (id),
      constraint statement_stations_closed_check check (gross_minor = deductions_minor + net_minor)
    );
    create index statement_stations_station_idx on statement_stations (station_id);

    create table statement_deductions (
      statement_id uuid not null,
      position smallint not null,
      code text not null,
      label text not null,
      rate_ppm integer not null,
      amount_minor bigint not null,
      constraint statement_deductions_pkey primary key (statement_id, position),
      constraint statement_deductions_statement_fkey foreign key (statement_id) references statements (id)
    );

    create table statement_holdbacks (
      statement_id uuid not null,
      holdback_id uuid not null,
      constraint statement_holdbacks_pkey primary key (statement_id, holdback_id),
      constraint statement_holdbacks_statement_fkey foreign key (statement_id) references statements (id),
      constraint statement_holdbacks_holdback_fkey foreign key (holdback_id) references distribution_holdbacks (id)
    );
    create index statement_holdbacks_holdback_idx on statement_holdbacks (holdback_id);

    create table statement_lines (
      statement_id uuid not null,
      line_number integer not null,
      "right" text not null,
      station_id uuid not null,
      work_id uuid,
      recording_id uuid,
      title text not null,
      artist text not null,
      code text,
      plays integer not null,
      credited_ms bigint not null,
      share_ppm integer not null,
      amount_minor bigint not null,
      constraint statement_lines_pkey primary key (statement_id, line_number),
      constraint statement_lines_statement_fkey foreign key (statement_id) references statements (id),
      constraint statement_lines_station_fkey foreign key (station_id) references stations (id),
      constraint statement_lines_work_fkey foreign key (work_id) references works (id),
      constraint statement_lines_recording_fkey foreign key (recording_id) references recordings (id),
      constraint statement_lines_number_check check (line_number >= 1),
      constraint statement_lines_subject_check check (num_nonnulls(work_id, recording_id) = 1),
      constraint statement_lines_right_check check (("right" = 'works') = (work_id is not null)),
      constraint statement_lines_plays_check check (plays >= 1 and credited_ms >= 0 and amount_minor >= 0)
    );
    create index statement_lines_station_idx on statement_lines (station_id);
    create index statement_lines_work_idx on statement_lines (work_id);
    create index statement_lines_recording_idx on statement_lines (recording_id);

    create table statement_line_plays (
      statement_id uuid not null,
      line_number integer not null,
      play_id uuid not null,
      credited_ms bigint not null,
      constraint statement_line_plays_pkey primary key (statement_id, line_number, play_id),
      constraint statement_line_plays_line_fkey foreign key (statement_id, line_number)
        references statement_lines (statement_id, line_number),
      constraint statement_line_plays_play_fkey foreign key (play_id) references plays (id)
    );
    create index statement_line_plays_play_idx on statement_line_plays (play_id);

    create table statement_files (
      statement_id uuid not null,
      kind text not null,
      storage_key text not null,
      size_bytes bigint not null,
      sha256 bytea not null,
      created_at timestamptz not null default now(),
      constraint statement_files_pkey primary key (statement_id, kind),
      constraint statement_files_statement_fkey foreign key (statement_id) references statements (id),
      constraint statement_files_kind_check check (kind in ('pdf', 'csv')),
      constraint statement_files_sha256_check check (octet_length(sha256) = 32)
    );

    do $$
    declare
      append_only text;
    begin
      foreach append_only in array array[
        'distribution_stations', 'distribution_deductions', 'distribution_pools', 'distribution_holdbacks',
        'statements', 'statement_stations', 'statement_deductions', 'statement_holdbacks', 'statement_lines', 'statement_line_plays',
        'statement_files', 'distribution_rules', 'deduction_rules'
      ] loop
        execute format('create trigger %I before update or delete on %I for each row execute function refuse_change()',
          append_only || '_append_only', append_only);
      end loop;
    end
    $$;

    create table disputes (
      id uuid not null default gen_random_uuid(),
      number integer not null generated always as identity,
      play_id uuid not null,
      status text not null default 'open',
      reason text not null,
      -- The facts as they stood when the dispute was opened, whatever is decided later.
      evidence jsonb not null,
      opened_by uuid not null,
      opened_at timestamptz not null default now(),
      decided_by uuid,
      decided_at timestamptz,
      decision_reason text,
      constraint disputes_pkey primary key (id),
      constraint disputes_number_key unique (number),
      constraint disputes_play_fkey foreign key (play_id) references plays (id),
      constraint disputes_opened_by_fkey foreign key (opened_by) references users (id),
      constraint disputes_decided_by_fkey foreign key (decided_by) references users (id),
      constraint disputes_status_check check (status in ('open', 'upheld', 'dismissed')),
      constraint disputes_reason_check check (reason <> ''),
      constraint disputes_decision_check check (
        (status = 'open') = (num_nonnulls(decided_by, decided_at, decision_reason) = 0)
        and num_nonnulls(decided_by, decided_at, decision_reason) in (0, 3)
      )
    );
    create unique index disputes_open_once on disputes (play_id) where status = 'open';
    create index disputes_play_idx on disputes (play_id);
    create index disputes_opened_by_idx on disputes (opened_by);
    create index disputes_decided_by_idx on disputes (decided_by);
    create index disputes_listing_idx on disputes (status, opened_at desc);

    create table dispute_messages (
      id uuid not null default gen_random_uuid(),
      dispute_id uuid not null,
      author_id uuid not null,
      body text not null,
      created_at timestamptz not null default now(),
      constraint dispute_messages_pkey primary key (id),
      constraint dispute_messages_dispute_fkey foreign key (dispute_id) references disputes (id),
      constraint dispute_messages_author_fkey foreign key (author_id) references users (id),
      constraint dispute_messages_body_check check (body <> '')
    );
    create index dispute_messages_dispute_idx on dispute_messages (dispute_id, created_at);
    create index dispute_messages_author_idx on dispute_messages (author_id);
    create trigger dispute_messages_append_only before update or delete on dispute_messages
      for each row execute function refuse_change();
  `)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop table dispute_messages, disputes, statement_files, statement_line_plays, statement_lines,
      statement_holdbacks, statement_deductions, statement_stations, statements, distribution_holdbacks, distribution_pools,
      distribution_deductions, distribution_stations, distributions, distribution_months, deduction_rules,
      distribution_rules;
    drop trigger plays_month_open on plays;
    drop function refuse_play_in_closed_month();
    drop function refuse_issued_distribution();
  `)
}
