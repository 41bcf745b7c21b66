import { type MigrationInterface, type QueryRunner } from 'typeorm'

/** Whether a search has a surrogate. Those made before there was one go on without. */
export class Surrogate1796300600000 implements MigrationInterface {
  readonly name = 'Surrogate1796300600000'

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`ALTER TABLE "search" ADD COLUMN "surrogate" boolean NOT NULL DEFAULT (0)`)
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query(`ALTER TABLE "search" DROP COLUMN "surrogate"`)
  }
}
