import { type MigrationInterface, type QueryRunner } from 'typeorm'

const importedCandidate = `CREATE TABLE "imported_candidate" (
    "campaignId" varchar NOT NULL,
    "candidateKey" varchar NOT NULL,
    "name" varchar NOT NULL,
    "source" varchar NOT NULL,
    "line" integer NOT NULL,
    "authorId" varchar NOT NULL,
    "createdAt" varchar NOT NULL,
    CONSTRAINT "FK_77cdbd92be9bee6df488f80cde5" FOREIGN KEY ("campaignId") REFERENCES "campaign" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_111aed103ecbc24b976072ebc22" FOREIGN KEY ("candidateKey") REFERENCES "candidate" ("key") ON DELETE NO ACTION ON UPDATE NO ACTION,
    CONSTRAINT "FK_aea36234154e12978ff2776f97d" FOREIGN KEY ("authorId") REFERENCES "account" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION,
    PRIMARY KEY ("campaignId", "candidateKey")
  )`

/** SQLite cannot change a column: the table is made anew around its rows. Nothing refers to it. */
const shortlistEntry = (searchId: string): string[] => [
  `CREATE TABLE "temporary_shortlist_entry" (
    "shortlistId" varchar NOT NULL,
    "rank" integer NOT NULL,
    "candidateKey" varchar NOT NULL,
    "searchId" ${searchId},
    "outcome" text NOT NULL,
    CONSTRAINT "FK_4baf96e61e5740ca0ee2aadf1b2" FOREIGN KEY ("shortlistId") REFERENCES "shortlist" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_b5428b072590356d5ece2e06496" FOREIGN KEY ("candidateKey") REFERENCES "candidate" ("key") ON DELETE NO ACTION ON UPDATE NO ACTION,
    CONSTRAINT "FK_eb37fd2598830b4cdf630a55b51" FOREIGN KEY ("searchId") REFERENCES "search" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    PRIMARY KEY ("shortlistId", "rank")
  )`,
  `INSERT INTO "temporary_shortlist_entry" ("shortlistId", "rank", "candidateKey", "searchId", "outcome")
    SELECT "shortlistId", "rank", "candidateKey", "searchId", "outcome" FROM "shortlist_entry"`,
  `DROP TABLE "shortlist_entry"`,
  `ALTER TABLE "temporary_shortlist_entry" RENAME TO "shortlist_entry"`,
  `CREATE INDEX "IDX_b5428b072590356d5ece2e0649" ON "shortlist_entry" ("candidateKey")`,
]

/** Candidates that a campaign imports; places of shortlists that no search found. */
export class ImportedCandidates1796200300000 implements MigrationInterface {
  readonly name = 'ImportedCandidates1796200300000'

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(importedCandidate)
    await runner.query(
      `CREATE INDEX "IDX_111aed103ecbc24b976072ebc2" ON "imported_candidate" ("candidateKey")`,
    )
    for (const statement of shortlistEntry('varchar')) await runner.query(statement)
  }

  /** Shortlists of imported candidates do not fit the older schema and are removed. */
  async down(runner: QueryRunner): Promise<void> {
    await runner.query(
      `DELETE FROM "shortlist" WHERE "id" IN (SELECT "shortlistId" FROM "shortlist_entry" WHERE "searchId" IS NULL)`,
    )
    await runner.query(`DELETE FROM "shortlist_entry" WHERE "searchId" IS NULL`)
    for (const statement of shortlistEntry('varchar NOT NULL')) await runner.query(statement)
    await runner.query(`DROP TABLE "imported_candidate"`)
  }
}
