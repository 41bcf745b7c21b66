import { type MigrationInterface, type QueryRunner } from 'typeorm'

const tables = {
  explored_sample: `
    "id" varchar PRIMARY KEY NOT NULL,
    "address" varchar NOT NULL,
    "searchId" varchar,
    "state" text,
    "drawn" integer NOT NULL,
    "ended" boolean NOT NULL,
    "usedAt" integer NOT NULL,
    CONSTRAINT "UQ_56c4cc59a6d0e5bbf21067d1e4e" UNIQUE ("address"),
    CONSTRAINT "FK_30695c45467ae78bd52a03fa263" FOREIGN KEY ("searchId") REFERENCES "search" ("id") ON DELETE CASCADE ON UPDATE NO ACTION`,
  explored_candidate: `
    "sampleId" varchar NOT NULL,
    "place" integer NOT NULL,
    "candidateKey" varchar NOT NULL,
    "polytopeKey" varchar NOT NULL,
    "heights" text NOT NULL,
    "island" integer,
    "score" real,
    CONSTRAINT "FK_878f9cef0b361ce887c837755de" FOREIGN KEY ("sampleId") REFERENCES "explored_sample" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    PRIMARY KEY ("sampleId", "place")`,
  explored_column: `
    "id" varchar PRIMARY KEY NOT NULL,
    "sampleId" varchar NOT NULL,
    "expressionHash" varchar NOT NULL,
    "evaluated" integer NOT NULL,
    CONSTRAINT "UQ_f57ffc523418ff206c5dd776249" UNIQUE ("sampleId", "expressionHash"),
    CONSTRAINT "FK_0d79998470be49a0acabc5ce384" FOREIGN KEY ("sampleId") REFERENCES "explored_sample" ("id") ON DELETE CASCADE ON UPDATE NO ACTION`,
  explored_cells: `
    "columnId" varchar NOT NULL,
    "first" integer NOT NULL,
    "cells" text NOT NULL,
    CONSTRAINT "FK_33373cd80faec610a6a7977fef5" FOREIGN KEY ("columnId") REFERENCES "explored_column" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    PRIMARY KEY ("columnId", "first")`,
}

/** Samples whose observables are looked at, and their columns. All of it can be computed again. */
export class Explorations1796300400001 implements MigrationInterface {
  readonly name = 'Explorations1796300400001'

  async up(runner: QueryRunner): Promise<void> {
    for (const [name, columns] of Object.entries(tables))
      await runner.query(`CREATE TABLE "${name}" (${columns}\n  )`)
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const name of Object.keys(tables).reverse()) await runner.query(`DROP TABLE "${name}"`)
  }
}
