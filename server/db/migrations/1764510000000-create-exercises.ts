import {type MigrationInterface, type QueryRunner} from 'typeorm';

/** Exercises and their versions; a version is never changed, which the database itself holds. */
export class CreateExercises1764510000000 implements MigrationInterface {
  readonly name = 'CreateExercises1764510000000';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`
      create table exercise (
        id uuid primary key,
        created_at timestamptz(3) not null default now(),
        updated_at timestamptz(3) not null default now(),
        organisation_id uuid not null references organisation (id) on delete restrict,
        number integer not null,
        state text not null default 'draft' constraint exercise_state_check
          check (state in ('draft', 'published', 'archived')),
        version integer not null default 1,
        constraint exercise_organisation_id_id_key unique (organisation_id, id),
        constraint exercise_organisation_id_number_key unique (organisation_id, number)
      )`);
    await queryRunner.query(`
      create table exercise_version (
        id uuid primary key,
        created_at timestamptz(3) not null default now(),
        updated_at timestamptz(3) not null default now(),
        organisation_id uuid not null references organisation (id) on delete restrict,
        exercise_id uuid not null,
        number integer not null,
        title text not null,
        document jsonb not null,
        model_solution jsonb,
        check_report jsonb,
        constraint exercise_version_organisation_id_id_key unique (organisation_id, id),
        constraint exercise_version_organisation_id_exercise_id_number_key
          unique (organisation_id, exercise_id, number),
        foreign key (organisation_id, exercise_id)
          references exercise (organisation_id, id) on delete restrict
      )`);
    await queryRunner.query(`
      create function refuse_update() returns trigger language plpgsql as $$
      begin
        raise exception 'a row of % is never changed', tg_table_name;
      end $$`);
    await queryRunner.query(`
      create trigger exercise_version_refuse_update before update on exercise_version
        for each row execute function refuse_update()`);
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('drop table exercise_version');
    await queryRunner.query('drop function refuse_update');
    await queryRunner.query('drop table exercise');
  }
}
