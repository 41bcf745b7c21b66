import { type MigrationInterface, type QueryRunner } from 'typeorm'

const statements = [
  `CREATE TABLE "external_table" (
    "id" varchar PRIMARY KEY NOT NULL,
    "campaignId" varchar NOT NULL,
    "shortlistId" varchar,
    "name" varchar NOT NULL,
    "columns" text NOT NULL,
    "rowCount" integer NOT NULL,
    "authorId" varchar NOT NULL,
    "createdAt" varchar NOT NULL,
    CONSTRAINT "FK_688ba574f6903c24d2079385715" FOREIGN KEY ("campaignId") REFERENCES "campaign" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_d8b124ee778f39fb45638a4ca55" FOREIGN KEY ("shortlistId") REFERENCES "shortlist" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_e6f201c3fd01802fb85e2e57edb" FOREIGN KEY ("authorId") REFERENCES "account" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION
  )`,
  `CREATE INDEX "IDX_688ba574f6903c24d207938571" ON "external_table" ("campaignId")`,
  `CREATE TABLE "external_row" (
    "tableId" varchar NOT NULL,
    "candidateKey" varchar NOT NULL,
    "values" text NOT NULL,
    CONSTRAINT "FK_f0a74b3bd6cec87b95cf60d11eb" FOREIGN KEY ("tableId") REFERENCES "external_table" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    PRIMARY KEY ("tableId", "candidateKey")
  )`,
]

/** Columns that people bring along, keyed by candidate. */
export class ExternalTables1796300300001 implements MigrationInterface {
  readonly name = 'ExternalTables1796300300001'

  async up(runner: QueryRunner): Promise<void> {
    for (const statement of statements) await runner.query(statement)
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query(`DROP TABLE "external_row"`)
    await runner.query(`DROP TABLE "external_table"`)
  }
}
