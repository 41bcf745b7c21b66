import { type MigrationInterface, type QueryRunner } from 'typeorm'

const statements = [
  `CREATE TABLE "candidate_invariants" (
    "candidateKey" varchar PRIMARY KEY NOT NULL,
    "wallKey" varchar NOT NULL,
    "version" integer NOT NULL,
    "h11" integer NOT NULL,
    "h21" integer NOT NULL,
    "invariants" text NOT NULL,
    CONSTRAINT "FK_546badcee3662144ddb9b8e6731" FOREIGN KEY ("candidateKey") REFERENCES "candidate" ("key") ON DELETE CASCADE ON UPDATE NO ACTION
  )`,
  `CREATE INDEX "IDX_752b7146299e5ba5c4cfc9680f" ON "candidate_invariants" ("wallKey")`,
  `CREATE INDEX "IDX_226d6fbf77a029924fda8be330" ON "candidate_invariants" ("h11", "h21")`,
]

/** Wall-type invariants of candidates; filled in the background for those that are stored already. */
export class CandidateInvariants1796200400000 implements MigrationInterface {
  readonly name = 'CandidateInvariants1796200400000'

  async up(runner: QueryRunner): Promise<void> {
    for (const statement of statements) await runner.query(statement)
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('DROP TABLE "candidate_invariants"')
  }
}
