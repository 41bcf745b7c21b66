import { type MigrationInterface, type QueryRunner } from 'typeorm'

const columns = [
  ['campaign', '"secondReader" boolean NOT NULL DEFAULT (0)'],
  ['verdict', '"readers" text'],
  ['verdict', '"undoesId" integer'],
  ['verdict', '"restoresId" integer'],
] as const

/** Verdicts that need two people, where a campaign asks for it; undone verdicts. */
export class SecondReader1796400000000 implements MigrationInterface {
  readonly name = 'SecondReader1796400000000'

  async up(runner: QueryRunner): Promise<void> {
    for (const [table, column] of columns) await runner.query(`ALTER TABLE "${table}" ADD COLUMN ${column}`)
  }

  /** The history stays as entries; that some were undone is forgotten, what stands last is the same. */
  async down(runner: QueryRunner): Promise<void> {
    for (const column of ['restoresId', 'undoesId', 'readers']) {
      await runner.query(`ALTER TABLE "verdict" DROP COLUMN "${column}"`)
    }
    await runner.query(`ALTER TABLE "campaign" DROP COLUMN "secondReader"`)
  }
}
