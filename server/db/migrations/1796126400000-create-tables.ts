import type { MigrationInterface, QueryRunner } from 'typeorm';

const ACCOUNTS = `
create table teams (id uuid primary key, name text not null, made_at timestamptz not null);

create table accounts (
  id uuid primary key,
  team_id uuid not null references teams,
  email text not null unique,
  name text not null,
  roles text[] not null check (cardinality(roles) > 0),
  password_hash text,
  demo boolean not null,
  added_at timestamptz not null,
  stopped_at timestamptz,
  last_sign_in_at timestamptz);
create index accounts_team on accounts (team_id);

create table sessions (
  id uuid primary key,
  account_id uuid not null references accounts,
  started_at timestamptz not null,
  revoked_at timestamptz);
create index sessions_account on sessions (account_id);

create table refresh_tokens (
  digest text primary key,
  session_id uuid not null references sessions on delete cascade,
  expires_at timestamptz not null,
  used_at timestamptz);
create index refresh_tokens_session on refresh_tokens (session_id);

create table invitations (
  account_id uuid primary key references accounts,
  digest text not null unique,
  made_at timestamptz not null,
  expires_at timestamptz not null);

create table messages (
  id uuid primary key,
  team_id uuid not null references teams,
  recipient text not null,
  subject text not null,
  text text not null,
  at timestamptz not null,
  sent_at timestamptz,
  tries integer not null default 0);
create index messages_team on messages (team_id, at desc);
create index messages_unsent on messages (at) where sent_at is null;`;

const STUDIES = `
create table benches (
  id uuid primary key,
  team_id uuid not null references teams,
  name text not null,
  place text not null,
  heat_source text not null,
  notes text not null,
  added_at timestamptz not null);
create unique index benches_name on benches (team_id, lower(name));

create table coolers (
  id uuid primary key,
  team_id uuid not null references teams,
  name text not null,
  notes text not null,
  added_at timestamptz not null);
create unique index coolers_name on coolers (team_id, lower(name));

create table studies (
  id uuid primary key,
  team_id uuid not null references teams,
  name text not null,
  question text not null,
  bench_id uuid not null references benches,
  prepared_by uuid not null references accounts,
  made_at timestamptz not null);
create unique index studies_name on studies (team_id, lower(name));
create index studies_newest on studies (team_id, made_at desc);
create index studies_bench on studies (bench_id);

create table conditions (
  id uuid primary key,
  study_id uuid not null references studies,
  place integer not null,
  name text not null,
  nominal_watts double precision check (nominal_watts > 0),
  rise_evidence text,
  resistance_evidence text,
  unique (study_id, place));
create unique index conditions_name on conditions (study_id, lower(name));

create table study_coolers (
  study_id uuid not null references studies,
  cooler_id uuid not null references coolers,
  place integer not null,
  reference boolean not null,
  primary key (study_id, cooler_id),
  unique (study_id, place));
create unique index study_coolers_reference on study_coolers (study_id) where reference;`;

const RUNS = `
create table mounts (
  id uuid primary key,
  study_id uuid not null,
  cooler_id uuid not null,
  name text not null,
  unique (study_id, cooler_id, name),
  foreign key (study_id, cooler_id) references study_coolers);

create table logs (
  id uuid primary key,
  team_id uuid not null references teams,
  digest text not null check (digest ~ '^[0-9a-f]{64}$'),
  size integer not null,
  stored_at timestamptz not null,
  unique (team_id, digest));

create table log_parts (
  log_id uuid not null references logs,
  part integer not null,
  bytes bytea not null,
  primary key (log_id, part));
alter table log_parts alter column bytes set storage external;

create table runs (
  id uuid primary key,
  study_id uuid not null references studies,
  condition_id uuid not null references conditions,
  cooler_id uuid not null,
  mount_id uuid references mounts,
  name text not null,
  test_order integer check (test_order > 0),
  file_name text not null,
  log_id uuid not null references logs,
  columns jsonb not null,
  column_map jsonb not null,
  chosen_map jsonb,
  fixed_ambient_celsius double precision,
  hand_window jsonb,
  rise_celsius double precision not null,
  resistance_kelvin_per_watt double precision,
  summary jsonb not null,
  sketch jsonb not null,
  left_out_reason text,
  left_out_by uuid references accounts,
  left_out_at timestamptz,
  brought_in_by uuid not null references accounts,
  brought_in_at timestamptz not null,
  unique (study_id, log_id),
  foreign key (study_id, cooler_id) references study_coolers,
  check ((left_out_reason is null) = (left_out_at is null)));
create index runs_condition on runs (condition_id);
create index runs_study on runs (study_id) include (left_out_at);
create index runs_log on runs (log_id);`;

const VERDICTS = `
create table thresholds (
  id uuid primary key,
  team_id uuid not null references teams,
  number integer not null,
  confidence double precision not null,
  power double precision not null,
  gap_that_matters_celsius double precision not null,
  reason text not null,
  made_by text not null,
  in_force_since timestamptz not null,
  unique (team_id, number));

create table verdicts (
  id uuid primary key,
  team_id uuid not null references teams,
  study_id uuid not null references studies,
  condition_id uuid not null references conditions,
  metric text not null check (metric in ('rise', 'resistance')),
  state text not null check (state in ('judged', 'submitted', 'sent back', 'signed off', 'withdrawn')),
  state_since timestamptz not null,
  prepared_by uuid not null references accounts,
  judged_at timestamptz not null,
  thresholds_id uuid not null references thresholds,
  method text not null,
  engine text not null,
  input jsonb not null,
  judgement jsonb not null,
  data_digest text not null,
  evidence text not null,
  pairs jsonb not null,
  cautions integer not null,
  stops integer not null,
  gap double precision,
  margin_of_error double precision,
  clearance double precision,
  smallest_visible_gap double precision,
  replaced_by uuid references verdicts,
  last_re_run_at timestamptz,
  last_re_run_by text,
  last_re_run_result text check (last_re_run_result in ('identical', 'differs', 'can''t re-run')));
-- The same evidence judged by the same thresholds and method is one verdict, however often it is asked for.
create unique index verdicts_same on verdicts (condition_id, metric, data_digest, thresholds_id, method)
  where state <> 'withdrawn';
create index verdicts_newest on verdicts (team_id, judged_at desc, id);
create index verdicts_state on verdicts (team_id, state, judged_at desc, id);
create index verdicts_study on verdicts (study_id, judged_at desc, id);

create table verdict_runs (
  verdict_id uuid not null references verdicts,
  place integer not null,
  run_id uuid not null references runs,
  digest text not null,
  cooler text not null,
  mount text,
  left_out_reason text,
  primary key (verdict_id, place));

create table ledger_entries (
  id uuid primary key,
  team_id uuid not null references teams,
  number integer not null,
  at timestamptz not null,
  by text not null,
  role text not null,
  action text not null,
  subject_kind text not null,
  subject_id uuid not null,
  subject_name text not null,
  content jsonb not null,
  previous text,
  digest text not null,
  unique (team_id, number));
create index ledger_subject on ledger_entries (team_id, subject_id, number);`;

/** The tables of the first version: accounts, studies, runs with their raw files, verdicts, the ledger. */
export class CreateTables1796126400000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    for (const part of [ACCOUNTS, STUDIES, RUNS, VERDICTS]) await runner.query(part);
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query(`drop table ledger_entries, verdict_runs, verdicts, thresholds, runs, log_parts, logs, mounts,
      study_coolers, conditions, studies, coolers, benches, messages, invitations, refresh_tokens, sessions,
      accounts, teams`);
  }
}
