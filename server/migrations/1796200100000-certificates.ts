import type { MigrationInterface, QueryRunner } from 'typeorm'

const tables = [
  `CREATE TABLE "certificate" (
    "id" varchar PRIMARY KEY NOT NULL,
    "candidateKey" varchar NOT NULL,
    "campaignId" varchar NOT NULL,
    "targetVersionId" varchar,
    "scoringHash" varchar,
    "engineVersion" varchar NOT NULL,
    "certifierVersion" varchar NOT NULL,
    "passed" boolean NOT NULL,
    "checks" text NOT NULL,
    "notCertified" text NOT NULL,
    "body" text NOT NULL,
    "milliseconds" integer NOT NULL,
    "authorId" varchar NOT NULL,
    "createdAt" varchar NOT NULL,
    CONSTRAINT "FK_a3391d66e87e3fde1dc4f2e2333" FOREIGN KEY ("candidateKey") REFERENCES "candidate" ("key") ON DELETE NO ACTION ON UPDATE NO ACTION,
    CONSTRAINT "FK_7d39566f5b36927219233de56bf" FOREIGN KEY ("campaignId") REFERENCES "campaign" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_e73c17b93bfe627b6a51fcb54d6" FOREIGN KEY ("targetVersionId") REFERENCES "target_version" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_20bc8b003471a84dd6e1ac5c75f" FOREIGN KEY ("authorId") REFERENCES "account" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION
  )`,
  `CREATE TABLE "certification" (
    "id" varchar PRIMARY KEY NOT NULL,
    "campaignId" varchar NOT NULL,
    "targetVersionId" varchar,
    "state" varchar NOT NULL,
    "leaseOwner" varchar,
    "leaseUntil" integer,
    "authorId" varchar NOT NULL,
    "createdAt" varchar NOT NULL,
    "finishedAt" varchar,
    CONSTRAINT "FK_0430e80ed0b9efccd8723e3c578" FOREIGN KEY ("campaignId") REFERENCES "campaign" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_3b1e324fd12d6667c4104f54f2a" FOREIGN KEY ("targetVersionId") REFERENCES "target_version" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_b8a164a59aba863c0ecf4bae0d7" FOREIGN KEY ("authorId") REFERENCES "account" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION
  )`,
  `CREATE TABLE "certification_task" (
    "certificationId" varchar NOT NULL,
    "place" integer NOT NULL,
    "candidateKey" varchar NOT NULL,
    "state" varchar NOT NULL,
    "certificateId" varchar,
    "failure" text,
    CONSTRAINT "FK_cc795379985134b59069c331935" FOREIGN KEY ("certificationId") REFERENCES "certification" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_366532805e833671484a88bc87a" FOREIGN KEY ("candidateKey") REFERENCES "candidate" ("key") ON DELETE NO ACTION ON UPDATE NO ACTION,
    CONSTRAINT "FK_2b044ae8dfec4aa3fa421b5c83f" FOREIGN KEY ("certificateId") REFERENCES "certificate" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    PRIMARY KEY ("certificationId", "place")
  )`,
]

const indices = [
  `CREATE INDEX "IDX_9dd1e0d8528980266b2fa0ff42" ON "certificate" ("candidateKey", "campaignId")`,
  `CREATE INDEX "IDX_0430e80ed0b9efccd8723e3c57" ON "certification" ("campaignId")`,
  `CREATE INDEX "IDX_4897ac0a6388ea5a1dd79fb67d" ON "certification" ("state")`,
  `CREATE INDEX "IDX_366532805e833671484a88bc87" ON "certification_task" ("candidateKey")`,
]

const verdictColumns =
  '"id", "campaignId", "candidateKey", "targetVersionId", "value", "reason", "override", "authorId", "createdAt"'

/** SQLite takes a column with a foreign key in or out only by building the table anew. */
async function rebuildVerdicts(runner: QueryRunner, column: string, constraint: string): Promise<void> {
  await runner.query('DROP INDEX "IDX_1ff10ab7b83f66f086fa4ab655"')
  await runner.query(`CREATE TABLE "new_verdict" (
    "id" integer PRIMARY KEY AUTOINCREMENT NOT NULL,
    "campaignId" varchar NOT NULL,
    "candidateKey" varchar NOT NULL,
    "targetVersionId" varchar NOT NULL,
    "value" varchar NOT NULL,
    "reason" text NOT NULL,
    "override" boolean NOT NULL,
    "authorId" varchar NOT NULL,
    "createdAt" varchar NOT NULL,${column}
    CONSTRAINT "FK_8afea3213ff7494e3d5ff05fa17" FOREIGN KEY ("campaignId") REFERENCES "campaign" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_bc5e6edaa625228d8d95b61f1e6" FOREIGN KEY ("candidateKey") REFERENCES "candidate" ("key") ON DELETE NO ACTION ON UPDATE NO ACTION,
    CONSTRAINT "FK_ed914dfa42be801caab36a45ffb" FOREIGN KEY ("targetVersionId") REFERENCES "target_version" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_9516dbe09726a38c37545ef39a6" FOREIGN KEY ("authorId") REFERENCES "account" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION${constraint}
  )`)
  await runner.query(
    `INSERT INTO "new_verdict" (${verdictColumns}) SELECT ${verdictColumns} FROM "verdict" ORDER BY "id"`,
  )
  await runner.query('DROP TABLE "verdict"')
  await runner.query('ALTER TABLE "new_verdict" RENAME TO "verdict"')
  await runner.query(
    'CREATE INDEX "IDX_1ff10ab7b83f66f086fa4ab655" ON "verdict" ("campaignId", "candidateKey")',
  )
}

/** Certificates, the requests that make them, and the certificate a verdict rests on. */
export class Certificates1796200100000 implements MigrationInterface {
  readonly name = 'Certificates1796200100000'

  async up(runner: QueryRunner): Promise<void> {
    for (const statement of [...tables, ...indices]) await runner.query(statement)
    await rebuildVerdicts(
      runner,
      '\n    "certificateId" varchar,',
      `,
    CONSTRAINT "FK_fdabb570b6d86701810a19e14f7" FOREIGN KEY ("certificateId") REFERENCES "certificate" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    )
  }

  async down(runner: QueryRunner): Promise<void> {
    await rebuildVerdicts(runner, '', '')
    for (const name of ['certification_task', 'certification', 'certificate']) {
      await runner.query(`DROP TABLE "${name}"`)
    }
  }
}
