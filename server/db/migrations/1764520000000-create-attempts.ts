import {type MigrationInterface, type QueryRunner} from 'typeorm';

/** Attempts at exercises, their log in batches, and what the replay of the log gave. */
export class CreateAttempts1764520000000 implements MigrationInterface {
  readonly name = 'CreateAttempts1764520000000';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`
      create table attempt (
        id uuid primary key,
        created_at timestamptz(3) not null default now(),
        updated_at timestamptz(3) not null default now(),
        organisation_id uuid not null references organisation (id) on delete restrict,
        person_id uuid not null,
        exercise_id uuid not null,
        exercise_version_id uuid not null,
        state text not null constraint attempt_state_check
          check (state in ('running', 'handed-in', 'scored', 'failed')),
        seed bigint not null,
        writer_key uuid not null,
        started_at timestamptz(3) not null,
        handed_in_at timestamptz(3),
        last_batch integer not null default 0,
        last_entry integer not null default 0,
        last_entry_tick integer not null default 0,
        through_tick integer not null default 0,
        beat_at timestamptz(3),
        engine integer,
        failure text,
        constraint attempt_organisation_id_id_key unique (organisation_id, id),
        foreign key (organisation_id, person_id)
          references person (organisation_id, id) on delete restrict,
        foreign key (organisation_id, exercise_id)
          references exercise (organisation_id, id) on delete restrict,
        foreign key (organisation_id, exercise_version_id)
          references exercise_version (organisation_id, id) on delete restrict
      )`);
    await queryRunner.query(
      'create index attempt_organisation_id_started_at_id_idx on attempt (organisation_id, started_at, id)',
    );
    await queryRunner.query(`
      create index attempt_organisation_id_person_id_started_at_id_idx
        on attempt (organisation_id, person_id, started_at, id)`);
    await queryRunner.query(
      'create index attempt_organisation_id_exercise_id_idx on attempt (organisation_id, exercise_id)',
    );
    await queryRunner.query(`
      create index attempt_organisation_id_exercise_version_id_idx
        on attempt (organisation_id, exercise_version_id)`);
    await queryRunner.query(`
      create table attempt_batch (
        id uuid primary key,
        created_at timestamptz(3) not null default now(),
        updated_at timestamptz(3) not null default now(),
        organisation_id uuid not null references organisation (id) on delete restrict,
        attempt_id uuid not null,
        number integer not null,
        through_tick integer not null,
        entries jsonb not null,
        constraint attempt_batch_organisation_id_id_key unique (organisation_id, id),
        constraint attempt_batch_organisation_id_attempt_id_number_key
          unique (organisation_id, attempt_id, number),
        foreign key (organisation_id, attempt_id)
          references attempt (organisation_id, id) on delete restrict
      )`);
    await queryRunner.query(`
      create trigger attempt_batch_refuse_update before update on attempt_batch
        for each row execute function refuse_update()`);
    await queryRunner.query(`
      create table attempt_result (
        id uuid primary key,
        created_at timestamptz(3) not null default now(),
        updated_at timestamptz(3) not null default now(),
        organisation_id uuid not null references organisation (id) on delete restrict,
        attempt_id uuid not null,
        engine integer not null,
        score double precision not null,
        passed boolean not null,
        criteria jsonb not null,
        hash text not null,
        hash_agrees boolean not null,
        scored_at timestamptz(3) not null,
        constraint attempt_result_organisation_id_id_key unique (organisation_id, id),
        constraint attempt_result_organisation_id_attempt_id_engine_key
          unique (organisation_id, attempt_id, engine),
        foreign key (organisation_id, attempt_id)
          references attempt (organisation_id, id) on delete restrict
      )`);
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    for (const table of ['attempt_result', 'attempt_batch', 'attempt']) {
      await queryRunner.query(`drop table ${table}`);
    }
  }
}
