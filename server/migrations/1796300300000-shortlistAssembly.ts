import { type MigrationInterface, type QueryRunner } from 'typeorm'

const rescoring = `CREATE TABLE "rescoring" (
    "id" varchar PRIMARY KEY NOT NULL,
    "campaignId" varchar NOT NULL,
    "targetVersionId" varchar NOT NULL,
    "name" varchar NOT NULL,
    "origin" text NOT NULL,
    "assembly" text NOT NULL,
    "entrants" text NOT NULL,
    "total" integer NOT NULL,
    "finds" integer NOT NULL,
    "state" varchar NOT NULL,
    "broken" integer NOT NULL,
    "failure" text,
    "shortlistId" varchar,
    "leaseOwner" varchar,
    "leaseUntil" integer,
    "authorId" varchar NOT NULL,
    "createdAt" varchar NOT NULL,
    "finishedAt" varchar,
    CONSTRAINT "FK_7443a8015c18684ffc45b99d010" FOREIGN KEY ("campaignId") REFERENCES "campaign" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_f91535e2df6073277986856220c" FOREIGN KEY ("targetVersionId") REFERENCES "target_version" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_f86ef5672dacc9c3114a0a5c27c" FOREIGN KEY ("authorId") REFERENCES "account" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION
  )`

/** What a list was made from, frozen; places in the list that was scored anew; requests to score lists anew. */
export class ShortlistAssembly1796300300000 implements MigrationInterface {
  readonly name = 'ShortlistAssembly1796300300000'

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`ALTER TABLE "shortlist" ADD COLUMN "provenance" text`)
    await runner.query(`ALTER TABLE "shortlist_entry" ADD COLUMN "front" integer`)
    await runner.query(`ALTER TABLE "shortlist_entry" ADD COLUMN "previousRank" integer`)
    await runner.query(`ALTER TABLE "shortlist_entry" ADD COLUMN "previousOutcome" text`)
    await runner.query(rescoring)
    await runner.query(`CREATE INDEX "IDX_7443a8015c18684ffc45b99d01" ON "rescoring" ("campaignId")`)
    await runner.query(`CREATE INDEX "IDX_e967a9786050b5fdc0b48072af" ON "rescoring" ("state")`)
  }

  /** The lists stay, without what the older schema has no place for. */
  async down(runner: QueryRunner): Promise<void> {
    await runner.query(`DROP TABLE "rescoring"`)
    for (const column of ['previousOutcome', 'previousRank', 'front']) {
      await runner.query(`ALTER TABLE "shortlist_entry" DROP COLUMN "${column}"`)
    }
    await runner.query(`ALTER TABLE "shortlist" DROP COLUMN "provenance"`)
  }
}
