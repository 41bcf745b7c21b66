import { type MigrationInterface, type QueryRunner } from 'typeorm'

/** Filled in the background for polytopes that are stored already. */
const columns = [
  ['edges', 'integer'],
  ['faces', 'integer'],
  ['edgePoints', 'integer'],
  ['facePoints', 'integer'],
  ['facetPoints', 'integer'],
  ['normalisedVolume', 'integer'],
  ['dualNormalisedVolume', 'integer'],
  ['planarSections', 'integer'],
  ['solidSections', 'integer'],
  ['nestedSections', 'integer'],
  ['rigidDivisors', 'integer'],
  ['splitDivisors', 'integer'],
  ['classBound', 'real'],
  ['summaryVersion', 'integer'],
  ['classes', 'integer'],
  ['classOrbits', 'integer'],
  ['classesSeen', 'integer'],
] as const

const collections = [
  `CREATE TABLE "collection" (
    "id" varchar PRIMARY KEY NOT NULL,
    "campaignId" varchar NOT NULL,
    "name" varchar NOT NULL,
    "description" text NOT NULL,
    "authorId" varchar NOT NULL,
    "createdAt" varchar NOT NULL,
    "publishedAt" varchar,
    CONSTRAINT "FK_7c63bd4ab9d805ae23b821815a7" FOREIGN KEY ("campaignId") REFERENCES "campaign" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_6bc1666cf0d91b09dbf87b55704" FOREIGN KEY ("authorId") REFERENCES "account" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION
  )`,
  `CREATE INDEX "IDX_7c63bd4ab9d805ae23b821815a" ON "collection" ("campaignId")`,
  `CREATE INDEX "IDX_0d6b2f72309dc8e206ab9e35ec" ON "collection" ("publishedAt")`,
  `CREATE TABLE "collection_polytope" (
    "collectionId" varchar NOT NULL,
    "polytopeKey" varchar NOT NULL,
    CONSTRAINT "FK_a2fb5f76c75d913cbf386b72018" FOREIGN KEY ("collectionId") REFERENCES "collection" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_9e0b6abe2674a0ddf6ba1f42f2f" FOREIGN KEY ("polytopeKey") REFERENCES "polytope" ("key") ON DELETE CASCADE ON UPDATE NO ACTION,
    PRIMARY KEY ("collectionId", "polytopeKey")
  )`,
  `CREATE INDEX "IDX_9e0b6abe2674a0ddf6ba1f42f2" ON "collection_polytope" ("polytopeKey")`,
]

/** More numbers of a polytope than the Hodge numbers and counts of faces, and collections of polytopes. */
export class LibraryNumbers1796200200000 implements MigrationInterface {
  readonly name = 'LibraryNumbers1796200200000'

  async up(runner: QueryRunner): Promise<void> {
    for (const [name, type] of columns)
      await runner.query(`ALTER TABLE "polytope" ADD COLUMN "${name}" ${type}`)
    await runner.query(`CREATE INDEX "IDX_96326c27c86a679350a6c2f5a3" ON "polytope" ("summaryVersion")`)
    for (const statement of collections) await runner.query(statement)
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('DROP TABLE "collection_polytope"')
    await runner.query('DROP TABLE "collection"')
    await runner.query('DROP INDEX "IDX_96326c27c86a679350a6c2f5a3"')
    for (const [name] of columns) await runner.query(`ALTER TABLE "polytope" DROP COLUMN "${name}"`)
  }
}
