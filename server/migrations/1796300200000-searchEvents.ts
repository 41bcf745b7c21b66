import { type MigrationInterface, type QueryRunner } from 'typeorm'

const up = [
  `CREATE TABLE "search_event" (
    "id" integer PRIMARY KEY AUTOINCREMENT NOT NULL,
    "searchId" varchar NOT NULL,
    "kind" varchar NOT NULL,
    "at" varchar NOT NULL,
    "accountId" varchar,
    "evaluations" integer,
    "note" text,
    CONSTRAINT "FK_a828d94b8a5dc03906827c9277c" FOREIGN KEY ("searchId") REFERENCES "search" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_1ea2d67686532fc76a9340a419c" FOREIGN KEY ("accountId") REFERENCES "account" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION
  )`,
  `CREATE INDEX "IDX_74a9aaa4a5dd8d5b9683ba86a5" ON "search_event" ("searchId", "id")`,
  // What is known of older searches: who began them, and how and when they ended.
  `INSERT INTO "search_event" ("searchId", "kind", "at", "accountId", "evaluations", "note")
    SELECT "id", 'queued', "createdAt", "authorId", 0, NULL FROM "search" ORDER BY "createdAt", "id"`,
  `INSERT INTO "search_event" ("searchId", "kind", "at", "accountId", "evaluations", "note")
    SELECT "id", "state", "finishedAt", NULL, "evaluations", "failureMessage" FROM "search"
    WHERE "finishedAt" IS NOT NULL AND "state" IN ('finished', 'cancelled', 'failed') ORDER BY "finishedAt", "id"`,
  `CREATE TRIGGER "search_event_is_final" BEFORE UPDATE ON "search_event"
    BEGIN SELECT RAISE(ABORT, 'Events of searches are never changed.'); END`,
]

/** The log of what happened to searches, begun for older ones with what is known of them. */
export class SearchEvents1796300200000 implements MigrationInterface {
  readonly name = 'SearchEvents1796300200000'

  async up(runner: QueryRunner): Promise<void> {
    for (const statement of up) await runner.query(statement)
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('DROP TABLE "search_event"')
  }
}
