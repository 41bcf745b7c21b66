import { type MigrationInterface, type QueryRunner } from 'typeorm'

/** Shortlists that are newer issues of others. */
export class Reissues1796400000002 implements MigrationInterface {
  readonly name = 'Reissues1796400000002'

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`ALTER TABLE "shortlist" ADD COLUMN "reissueOfId" varchar`)
    await runner.query(`ALTER TABLE "shortlist" ADD COLUMN "issue" integer NOT NULL DEFAULT (1)`)
  }

  /** The lists stay, as lists of their own. */
  async down(runner: QueryRunner): Promise<void> {
    for (const column of ['issue', 'reissueOfId']) {
      await runner.query(`ALTER TABLE "shortlist" DROP COLUMN "${column}"`)
    }
  }
}
