import {type MigrationInterface, type QueryRunner} from 'typeorm';

/** Organisations, their people, sessions and the counters of sign-in attempts. */
export class CreatePeople1764500000000 implements MigrationInterface {
  readonly name = 'CreatePeople1764500000000';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`
      create table organisation (
        id uuid primary key,
        created_at timestamptz(3) not null default now(),
        updated_at timestamptz(3) not null default now(),
        name text not null,
        is_demo boolean not null default false
      )`);
    await queryRunner.query(`
      create table person (
        id uuid primary key,
        created_at timestamptz(3) not null default now(),
        updated_at timestamptz(3) not null default now(),
        organisation_id uuid not null references organisation (id) on delete restrict,
        email text not null constraint person_email_key unique
          constraint person_email_check check (email = lower(email)),
        name text not null,
        role text not null constraint person_role_check
          check (role in ('trainee', 'technician', 'instructor', 'administrator')),
        password_hash text not null,
        external_id text,
        active boolean not null default true,
        preferences jsonb not null default '{"units": "si", "theme": "system"}',
        constraint person_organisation_id_id_key unique (organisation_id, id)
      )`);
    // As connect-pg-simple wants it.
    await queryRunner.query(`
      create table session (
        sid varchar primary key,
        sess json not null,
        expire timestamp(6) not null
      )`);
    await queryRunner.query('create index session_expire_idx on session (expire)');
    // As rate-limiter-flexible wants it.
    await queryRunner.query(`
      create table sign_in_limit (
        key varchar(255) primary key,
        points integer not null default 0,
        expire bigint
      )`);
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    for (const table of ['sign_in_limit', 'session', 'person', 'organisation']) {
      await queryRunner.query(`drop table ${table}`);
    }
  }
}
