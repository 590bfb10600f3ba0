import type { Knex } from 'knex'

/** Reference audio and fingerprints, station logs and what was heard in them, detections and plays. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table reference_audio (
      id uuid not null default gen_random_uuid(),
      recording_id uuid not null,
      file_name text not null,
      size_bytes bigint not null,
      sha256 bytea not null,
      storage_key text not null,
      format text,
      duration_ms bigint,
      status text not null default 'waiting',
      failure text,
      landmark_hashes integer,
      uploaded_by uuid not null,
      uploaded_at timestamptz not null default now(),
      constraint reference_audio_pkey primary key (id),
      constraint reference_audio_recording_fkey foreign key (recording_id) references recordings (id),
      constraint reference_audio_user_fkey foreign key (uploaded_by) references users (id),
      constraint reference_audio_sha256_check check (octet_length(sha256) = 32),
      constraint reference_audio_size_check check (size_bytes > 0),
      constraint reference_audio_status_check check (status in ('waiting', 'fingerprinting', 'ready', 'failed')),
      constraint reference_audio_failure_check check ((status = 'failed') = (failure is not null)),
      constraint reference_audio_ready_check check (
        status <> 'ready' or (duration_ms > 0 and landmark_hashes is not null)
      )
    );
    create index reference_audio_recording_idx on reference_audio (recording_id, uploaded_at desc);
    create index reference_audio_user_idx on reference_audio (uploaded_by);
    create index reference_audio_listing_idx on reference_audio (uploaded_at desc, id);

    create table fingerprints (
      reference_audio_id uuid not null,
      engine_version text not null,
      recording_id uuid not null,
      -- Grows with every fingerprint, so that a worker asks only for what it has not loaded yet.
      sequence bigint not null generated always as identity,
      landmarks bytea not null,
      created_at timestamptz not null default now(),
      constraint fingerprints_pkey primary key (reference_audio_id, engine_version),
      constraint fingerprints_reference_fkey foreign key (reference_audio_id) references reference_audio (id),
      constraint fingerprints_recording_fkey foreign key (recording_id) references recordings (id),
      constraint fingerprints_sequence_key unique (sequence)
    );
    create index fingerprints_recording_idx on fingerprints (recording_id, sequence desc);

    create table station_logs (
      id uuid not null default gen_random_uuid(),
      station_id uuid not null,
      file_name text not null,
      size_bytes bigint not null,
      sha256 bytea not null,
      -- Null once the audio is no longer kept.
      storage_key text,
      format text,
      started_at timestamptz not null,
      duration_ms bigint,
      -- What counts as covered by this log; at most two seconds shorter than the audio, where recorders overlap.
      airtime tstzrange,
      status text not null default 'queued',
      failure_code text,
      failure_message text,
      warnings text[] not null default '{}',
      music_ms bigint,
      speech_ms bigint,
      silence_ms bigint,
      uploaded_by uuid not null,
      uploaded_at timestamptz not null default now(),
      analysed_at timestamptz,
      constraint station_logs_pkey primary key (id),
      constraint station_logs_station_fkey foreign key (station_id) references stations (id),
      constraint station_logs_user_fkey foreign key (uploaded_by) references users (id),
      constraint station_logs_sha256_check check (octet_length(sha256) = 32),
      constraint station_logs_size_check check (size_bytes > 0),
      constraint station_logs_duration_check check (duration_ms > 0),
      constraint station_logs_status_check check (
        status in ('queued', 'analysing', 'analysed', 'rejected', 'failed')
      ),
      constraint station_logs_failure_check check (
        (status in ('rejected', 'failed')) = (failure_code is not null and failure_message is not null)
      ),
      constraint station_logs_analysed_check check (
        status <> 'analysed'
        or (duration_ms is not null and airtime is not null and analysed_at is not null
            and music_ms is not null and speech_ms is not null and silence_ms is not null)
      ),
      constraint station_logs_airtime_check check (not isempty(airtime)),
      -- The same minute of a station is held once, or its plays would be paid twice.
      constraint station_logs_no_overlap exclude using gist (
        station_id with =, airtime with &&
      ) where (status <> 'rejected')
    );
    -- The same file is held once; a rejected one may be sent again, for example with the right start.
    create unique index station_logs_sha256_key on station_logs (sha256) where status <> 'rejected';
    create index station_logs_station_idx on station_logs (station_id, started_at desc);
    create index station_logs_user_idx on station_logs (uploaded_by);

    create table log_analyses (
      id uuid not null default gen_random_uuid(),
      log_id uuid not null,
      engine_version text not null,
      catalogue_recordings integer not null,
      detections integer not null,
      decode_ms integer not null,
      analyse_ms integer not null,
      finished_at timestamptz not null default now(),
      constraint log_analyses_pkey primary key (id),
      constraint log_analyses_log_fkey foreign key (log_id) references station_logs (id)
    );
    create index log_analyses_log_idx on log_analyses (log_id, finished_at desc);

    create table log_spans (
      log_id uuid not null,
      start_ms bigint not null,
      end_ms bigint not null,
      kind text not null,
      constraint log_spans_pkey primary key (log_id, start_ms),
      constraint log_spans_log_fkey foreign key (log_id) references station_logs (id) on delete cascade,
      constraint log_spans_order_check check (start_ms >= 0 and end_ms > start_ms),
      constraint log_spans_kind_check check (kind in ('music', 'speech', 'silence'))
    );

    -- What the machine found. Never changed; partitioned by month because it only grows.
    create table detections (
      id uuid not null,
      started_at timestamptz not null,
      ended_at timestamptz not null,
      log_id uuid not null,
      station_id uuid not null,
      recording_id uuid not null,
      engine_version text not null,
      log_start_ms bigint not null,
      log_end_ms bigint not null,
      reference_start_ms bigint not null,
      speed_ratio double precision not null,
      confidence double precision not null,
      expected_false_alarms double precision not null,
      decision text not null,
      agreeing_hashes integer not null,
      evidence jsonb not null,
      created_at timestamptz not null default now(),
      constraint detections_pkey primary key (id, started_at),
      constraint detections_log_fkey foreign key (log_id) references station_logs (id),
      constraint detections_station_fkey foreign key (station_id) references stations (id),
      constraint detections_recording_fkey foreign key (recording_id) references recordings (id),
      constraint detections_order_check check (ended_at > started_at and log_end_ms > log_start_ms),
      constraint detections_log_start_check check (log_start_ms >= 0),
      constraint detections_speed_check check (speed_ratio between 0.5 and 2),
      constraint detections_confidence_check check (confidence between 0 and 99),
      constraint detections_decision_check check (decision in ('accept', 'review'))
    ) partition by range (started_at);
    create index detections_log_idx on detections (log_id);
    create index detections_station_idx on detections (station_id, started_at desc);
    create index detections_recording_idx on detections (recording_id, started_at desc);
    create trigger detections_append_only before update or delete on detections
      for each row execute function refuse_change();

    -- Call before inserting detections of that time. A partition carries the rule that one recording is found
    -- once at one place of one log, whatever engine or catalogue found it: running a log again doubles nothing.
    create function ensure_detections_partition(moment timestamptz) returns void language plpgsql as $$
    declare
      month_start timestamptz := date_trunc('month', moment, 'UTC');
      partition_name text := 'detections_' || to_char(month_start at time zone 'UTC', 'YYYY_MM');
    begin
      if to_regclass(partition_name) is not null then return; end if;
      perform pg_advisory_xact_lock(hashtext('ensure_detections_partition'));
      if to_regclass(partition_name) is not null then return; end if;
      execute format('create table %I partition of detections for values from (%L) to (%L)',
        partition_name, month_start, month_start + interval '1 month');
      execute format(
        'alter table %I add constraint %I exclude using gist (log_id with =, recording_id with =, '
        'int8range(log_start_ms, log_end_ms) with &&)', partition_name, partition_name || '_found_once');
      execute format('create trigger %I before truncate on %I for each statement execute function refuse_change()',
        partition_name || '_no_truncate', partition_name);
    end
    $$;

    create table detection_reviews (
      id bigint not null generated always as identity,
      detection_id uuid not null,
      detection_started_at timestamptz not null,
      outcome text not null,
      reason text not null,
      reviewed_by uuid not null,
      reviewed_at timestamptz not null default now(),
      constraint detection_reviews_pkey primary key (id),
      constraint detection_reviews_detection_fkey foreign key (detection_id, detection_started_at)
        references detections (id, started_at),
      constraint detection_reviews_user_fkey foreign key (reviewed_by) references users (id),
      constraint detection_reviews_outcome_check check (outcome in ('confirmed', 'rejected')),
      constraint detection_reviews_reason_check check (outcome = 'confirmed' or reason <> '')
    );
    create index detection_reviews_detection_idx on detection_reviews (detection_id, id desc);
    create index detection_reviews_user_idx on detection_reviews (reviewed_by);
    create trigger detection_reviews_append_only before update or delete on detection_reviews
      for each row execute function refuse_change();

    create table plays (
      id uuid not null default gen_random_uuid(),
      detection_id uuid,
      detection_started_at timestamptz,
      station_id uuid not null,
      recording_id uuid not null,
      started_at timestamptz not null,
      ended_at timestamptz not null,
      -- The day in the station's zone decides month, licence and shares.
      local_day date not null,
      status text not null default 'counted',
      created_at timestamptz not null default now(),
      constraint plays_pkey primary key (id),
      constraint plays_detection_key unique (detection_id),
      constraint plays_detection_fkey foreign key (detection_id, detection_started_at)
        references detections (id, started_at) match full,
      constraint plays_station_fkey foreign key (station_id) references stations (id),
      constraint plays_recording_fkey foreign key (recording_id) references recordings (id),
      constraint plays_order_check check (ended_at > started_at),
      constraint plays_status_check check (status in ('counted', 'removed')),
      -- A station plays one recording once at a time; two recordings may overlap while one fades into the other.
      constraint plays_counted_once exclude using gist (
        station_id with =, recording_id with =, tstzrange(started_at, ended_at) with &&
      ) where (status = 'counted')
    );
    create index plays_day_idx on plays (local_day, station_id);
    create index plays_recording_idx on plays (recording_id, local_day);
    create index plays_station_idx on plays (station_id, started_at desc);

    create table play_events (
      id bigint not null generated always as identity,
      play_id uuid not null,
      at timestamptz not null default now(),
      kind text not null,
      actor_user_id uuid,
      actor_name text not null,
      reason text,
      constraint play_events_pkey primary key (id),
      constraint play_events_play_fkey foreign key (play_id) references plays (id),
      constraint play_events_actor_fkey foreign key (actor_user_id) references users (id),
      constraint play_events_kind_check check (kind in ('created', 'removed', 'restored'))
    );
    create index play_events_play_idx on play_events (play_id, id);
    create index play_events_actor_idx on play_events (actor_user_id);
    create trigger play_events_append_only before update or delete on play_events
      for each row execute function refuse_change();
  `)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop table play_events, plays, detection_reviews, detections, log_spans, log_analyses, station_logs,
      fingerprints, reference_audio;
    drop function ensure_detections_partition(timestamptz);
  `)
}
