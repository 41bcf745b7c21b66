import { type MigrationInterface, type QueryRunner } from 'typeorm'

/** Columns of a search, with what they are for those that are there. */
const columns = [
  ['settings', `text NOT NULL DEFAULT ('{}')`],
  ['startsFrom', 'text'],
  ['extensions', `text NOT NULL DEFAULT ('[]')`],
  ['imported', 'text'],
] as const

const searchStart = `CREATE TABLE "search_start" (
    "searchId" varchar NOT NULL,
    "place" integer NOT NULL,
    "candidateKey" varchar NOT NULL,
    "polytopeKey" varchar NOT NULL,
    "heights" text NOT NULL,
    CONSTRAINT "FK_46a121d4b598a64a5185de13357" FOREIGN KEY ("searchId") REFERENCES "search" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    PRIMARY KEY ("searchId", "place")
  )`

/** Settings of methods, candidates to begin from, extensions, and results that were run elsewhere. */
export class SearchRunning1796300100000 implements MigrationInterface {
  readonly name = 'SearchRunning1796300100000'

  async up(runner: QueryRunner): Promise<void> {
    for (const [name, type] of columns) {
      await runner.query(`ALTER TABLE "search" ADD COLUMN "${name}" ${type}`)
    }
    await runner.query(searchStart)
  }

  /** Searches that were run elsewhere go: nothing here could carry them on. */
  async down(runner: QueryRunner): Promise<void> {
    await runner.query(`DROP TABLE "search_start"`)
    await runner.query(`DELETE FROM "search" WHERE "imported" IS NOT NULL`)
    for (const [name] of [...columns].reverse()) {
      await runner.query(`ALTER TABLE "search" DROP COLUMN "${name}"`)
    }
  }
}
