import { type MigrationInterface, type QueryRunner } from 'typeorm'

const statements = [
  `CREATE TABLE "assignment" (
    "targetId" varchar NOT NULL,
    "candidateKey" varchar NOT NULL,
    "campaignId" varchar NOT NULL,
    "reviewerId" varchar NOT NULL,
    "authorId" varchar NOT NULL,
    "createdAt" varchar NOT NULL,
    CONSTRAINT "FK_3d63535ea4a7c2d5ffda1f91095" FOREIGN KEY ("targetId") REFERENCES "target" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_4d7fcda3e52f4ed9d870e48adc7" FOREIGN KEY ("campaignId") REFERENCES "campaign" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_872b31c38d50710f348ff03a9d9" FOREIGN KEY ("reviewerId") REFERENCES "account" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    PRIMARY KEY ("targetId", "candidateKey")
  )`,
  `CREATE INDEX "IDX_b0f01c41cbb88ad77600b095ac" ON "assignment" ("campaignId", "reviewerId")`,
  `CREATE TABLE "shortlist_view" (
    "id" varchar PRIMARY KEY NOT NULL,
    "campaignId" varchar NOT NULL,
    "shortlistId" varchar,
    "name" varchar NOT NULL,
    "address" text NOT NULL,
    "authorId" varchar NOT NULL,
    "createdAt" varchar NOT NULL,
    CONSTRAINT "FK_6fd4b43a62d639e4007039e1928" FOREIGN KEY ("campaignId") REFERENCES "campaign" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_d7cbe7332515b0b45950d195cb1" FOREIGN KEY ("shortlistId") REFERENCES "shortlist" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_7bc3f3ff80199799890babd05b4" FOREIGN KEY ("authorId") REFERENCES "account" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION
  )`,
  `CREATE INDEX "IDX_6fd4b43a62d639e4007039e192" ON "shortlist_view" ("campaignId")`,
]

/** Candidates handed to reviewers; views of shortlists under names. */
export class Reviewing1796400000001 implements MigrationInterface {
  readonly name = 'Reviewing1796400000001'

  async up(runner: QueryRunner): Promise<void> {
    for (const statement of statements) await runner.query(statement)
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query(`DROP TABLE "shortlist_view"`)
    await runner.query(`DROP TABLE "assignment"`)
  }
}
