import { type MigrationInterface, type QueryRunner } from 'typeorm'

const statements = [
  `CREATE TABLE "comment" (
    "id" integer PRIMARY KEY AUTOINCREMENT NOT NULL,
    "campaignId" varchar NOT NULL,
    "candidateKey" varchar NOT NULL,
    "authorId" varchar NOT NULL,
    "text" text NOT NULL,
    "createdAt" varchar NOT NULL,
    "editedAt" varchar,
    "removedAt" varchar,
    "removedById" varchar,
    CONSTRAINT "FK_2da1250f7b6e16b9c08852e447a" FOREIGN KEY ("campaignId") REFERENCES "campaign" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_e7524d10466cb323f8b184a4c88" FOREIGN KEY ("candidateKey") REFERENCES "candidate" ("key") ON DELETE NO ACTION ON UPDATE NO ACTION,
    CONSTRAINT "FK_276779da446413a0d79598d4fbd" FOREIGN KEY ("authorId") REFERENCES "account" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION,
    CONSTRAINT "FK_36dbf89239c729b7bd891293715" FOREIGN KEY ("removedById") REFERENCES "account" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION
  )`,
  `CREATE INDEX "IDX_6af3097187d0d607df67416edf" ON "comment" ("campaignId", "candidateKey")`,
  `CREATE TABLE "mention" (
    "commentId" integer NOT NULL,
    "accountId" varchar NOT NULL,
    "seenAt" varchar,
    CONSTRAINT "FK_3d0e98f80fd75c10fa2d1cfab1d" FOREIGN KEY ("commentId") REFERENCES "comment" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_bb1f0b9f439938fbf98f5c8da7e" FOREIGN KEY ("accountId") REFERENCES "account" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION,
    PRIMARY KEY ("commentId", "accountId")
  )`,
  `CREATE INDEX "IDX_c3b7e3903f308e5092772565ec" ON "mention" ("accountId", "seenAt")`,
]

/** Comments on candidates, and the members named in them. */
export class Comments1796500000000 implements MigrationInterface {
  readonly name = 'Comments1796500000000'

  async up(runner: QueryRunner): Promise<void> {
    for (const statement of statements) await runner.query(statement)
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query(`DROP TABLE "mention"`)
    await runner.query(`DROP TABLE "comment"`)
  }
}
