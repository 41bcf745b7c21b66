import { type MigrationInterface, type QueryRunner } from 'typeorm'

/** Exact numbers of classes may be too large for a number: their digits are kept as text. */
export class ExactClassCounts1796200200001 implements MigrationInterface {
  readonly name = 'ExactClassCounts1796200200001'

  async up(runner: QueryRunner): Promise<void> {
    await runner.query('ALTER TABLE "polytope" ADD COLUMN "classDigits" varchar')
    await runner.query(
      'UPDATE "polytope" SET "classDigits" = CAST("classes" AS TEXT) WHERE "classes" IS NOT NULL',
    )
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('ALTER TABLE "polytope" DROP COLUMN "classDigits"')
  }
}
