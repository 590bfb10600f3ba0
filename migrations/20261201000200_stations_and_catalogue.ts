import type { Knex } from 'knex'

/** Stations and licences, parties, works, recordings, shares, and who of the users sees which of them. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    -- Both come with PostgreSQL's contrib modules and may be installed by the owner of a database.
    create extension if not exists btree_gist;
    create extension if not exists pg_trgm;

    create table stations (
      id uuid not null default gen_random_uuid(),
      call_name text not null,
      name text not null,
      time_zone text not null,
      contact_email text,
      created_at timestamptz not null default now(),
      constraint stations_pkey primary key (id),
      constraint stations_call_name_key unique (call_name),
      constraint stations_call_name_check check (call_name ~ '^[A-Z0-9-]{2,12}$'),
      constraint stations_name_check check (name <> '')
    );

    create table licences (
      id uuid not null default gen_random_uuid(),
      station_id uuid not null,
      valid_from date not null,
      valid_to date,
      monthly_fee_minor bigint not null,
      works_part_ppm integer not null,
      created_at timestamptz not null default now(),
      constraint licences_pkey primary key (id),
      constraint licences_station_fkey foreign key (station_id) references stations (id),
      constraint licences_validity_check check (valid_to is null or valid_to >= valid_from),
      constraint licences_fee_check check (monthly_fee_minor >= 0),
      constraint licences_works_part_check check (works_part_ppm between 0 and 1000000),
      -- Two licences for one day would charge a station twice. Its index serves the foreign key too.
      constraint licences_no_overlap exclude using gist (
        station_id with =, daterange(valid_from, valid_to, '[]') with &&
      )
    );

    create table user_stations (
      user_id uuid not null,
      station_id uuid not null,
      created_at timestamptz not null default now(),
      constraint user_stations_pkey primary key (user_id, station_id),
      constraint user_stations_user_fkey foreign key (user_id) references users (id) on delete cascade,
      constraint user_stations_station_fkey foreign key (station_id) references stations (id) on delete cascade
    );
    create index user_stations_station_idx on user_stations (station_id);

    create table parties (
      id uuid not null default gen_random_uuid(),
      name text not null,
      ipi text,
      ipi_check_ok boolean,
      created_at timestamptz not null default now(),
      constraint parties_pkey primary key (id),
      constraint parties_ipi_key unique (ipi),
      constraint parties_ipi_check check (ipi ~ '^[0-9]{11}$' and ipi <> '00000000000'),
      constraint parties_ipi_judged_check check ((ipi is null) = (ipi_check_ok is null)),
      constraint parties_name_check check (name <> '')
    );
    create index parties_name_search_idx on parties using gin (name gin_trgm_ops);

    create table user_parties (
      user_id uuid not null,
      party_id uuid not null,
      created_at timestamptz not null default now(),
      constraint user_parties_pkey primary key (user_id, party_id),
      constraint user_parties_user_fkey foreign key (user_id) references users (id) on delete cascade,
      constraint user_parties_party_fkey foreign key (party_id) references parties (id) on delete cascade
    );
    create index user_parties_party_idx on user_parties (party_id);

    create table works (
      id uuid not null default gen_random_uuid(),
      title text not null,
      creators text not null default '',
      iswc text,
      created_at timestamptz not null default now(),
      constraint works_pkey primary key (id),
      constraint works_iswc_key unique (iswc),
      constraint works_iswc_check check (iswc ~ '^T[0-9]{10}$'),
      constraint works_title_check check (title <> '')
    );
    create index works_search_idx on works using gin ((title || ' ' || creators) gin_trgm_ops);

    create table recordings (
      id uuid not null default gen_random_uuid(),
      -- The number the matching index knows a recording by: four bytes instead of sixteen in every posting.
      recording_number integer not null generated always as identity,
      isrc text not null,
      title text not null,
      artist text not null,
      duration_ms bigint,
      work_id uuid,
      created_at timestamptz not null default now(),
      constraint recordings_pkey primary key (id),
      constraint recordings_number_key unique (recording_number),
      constraint recordings_isrc_key unique (isrc),
      constraint recordings_isrc_check check (isrc ~ '^[A-Z]{2}[A-Z0-9]{3}[0-9]{7}$'),
      constraint recordings_title_check check (title <> ''),
      constraint recordings_artist_check check (artist <> ''),
      constraint recordings_duration_check check (duration_ms > 0),
      constraint recordings_work_fkey foreign key (work_id) references works (id)
    );
    create index recordings_work_idx on recordings (work_id);
    create index recordings_search_idx on recordings using gin ((title || ' ' || artist) gin_trgm_ops);

    create table shares (
      id uuid not null default gen_random_uuid(),
      work_id uuid,
      recording_id uuid,
      party_id uuid not null,
      share_ppm integer not null,
      valid_from date not null,
      valid_to date,
      created_at timestamptz not null default now(),
      constraint shares_pkey primary key (id),
      constraint shares_work_fkey foreign key (work_id) references works (id),
      constraint shares_recording_fkey foreign key (recording_id) references recordings (id),
      constraint shares_party_fkey foreign key (party_id) references parties (id),
      constraint shares_subject_check check (num_nonnulls(work_id, recording_id) = 1),
      constraint shares_share_check check (share_ppm between 1 and 1000000),
      constraint shares_validity_check check (valid_to is null or valid_to >= valid_from),
      -- One party holds one share of one thing on one day. The indexes serve the foreign keys too.
      constraint shares_work_no_overlap exclude using gist (
        work_id with =, party_id with =, daterange(valid_from, valid_to, '[]') with &&
      ) where (work_id is not null),
      constraint shares_recording_no_overlap exclude using gist (
        recording_id with =, party_id with =, daterange(valid_from, valid_to, '[]') with &&
      ) where (recording_id is not null)
    );
    create index shares_party_idx on shares (party_id);

    create table catalogue_imports (
      id uuid not null default gen_random_uuid(),
      file_name text not null,
      imported_by uuid not null,
      imported_at timestamptz not null default now(),
      constraint catalogue_imports_pkey primary key (id),
      constraint catalogue_imports_user_fkey foreign key (imported_by) references users (id)
    );
    create index catalogue_imports_user_idx on catalogue_imports (imported_by);

    create table catalogue_import_rows (
      import_id uuid not null,
      line integer not null,
      isrc text not null,
      title text not null,
      outcome text not null,
      messages text[] not null default '{}',
      constraint catalogue_import_rows_pkey primary key (import_id, line),
      constraint catalogue_import_rows_import_fkey foreign key (import_id) references catalogue_imports (id)
        on delete cascade,
      constraint catalogue_import_rows_line_check check (line >= 1),
      constraint catalogue_import_rows_outcome_check check (outcome in ('created', 'updated', 'unchanged', 'refused'))
    );
  `)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop table catalogue_import_rows, catalogue_imports, shares, recordings, works, user_parties, parties,
      user_stations, licences, stations;
  `)
}
