import { type MigrationInterface, type QueryRunner } from 'typeorm'

/** The uniform samples that searches keep of all their evaluations, with heights. */
export class SampledEvaluations1796300400000 implements MigrationInterface {
  readonly name = 'SampledEvaluations1796300400000'

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`CREATE TABLE "search_sample" (
      "searchId" varchar NOT NULL,
      "island" integer NOT NULL,
      "place" integer NOT NULL,
      "candidateKey" varchar NOT NULL,
      "polytopeKey" varchar NOT NULL,
      "kind" integer NOT NULL,
      "value" real NOT NULL,
      "heights" text NOT NULL,
      CONSTRAINT "FK_245286b62d380e5bbe7c752ecd0" FOREIGN KEY ("searchId") REFERENCES "search" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
      PRIMARY KEY ("searchId", "island", "place")
    )`)
  }

  /** Searches keep their results; only the samples go. */
  async down(runner: QueryRunner): Promise<void> {
    await runner.query(`DROP TABLE "search_sample"`)
  }
}
