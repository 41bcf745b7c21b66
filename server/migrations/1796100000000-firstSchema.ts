import { type MigrationInterface, type QueryRunner } from 'typeorm'

const tables = [
  `CREATE TABLE "account" (
    "id" varchar PRIMARY KEY NOT NULL,
    "email" varchar NOT NULL,
    "name" varchar NOT NULL,
    "passwordHash" varchar,
    "demo" boolean NOT NULL DEFAULT (0),
    "createdAt" varchar NOT NULL,
    CONSTRAINT "UQ_4c8f96ccf523e9a3faefd5bdd4c" UNIQUE ("email")
  )`,
  `CREATE TABLE "campaign" (
    "id" varchar PRIMARY KEY NOT NULL,
    "name" varchar NOT NULL,
    "description" text NOT NULL,
    "createdAt" varchar NOT NULL
  )`,
  `CREATE TABLE "polytope" (
    "key" varchar PRIMARY KEY NOT NULL,
    "name" varchar NOT NULL,
    "origin" varchar NOT NULL,
    "h11" integer NOT NULL,
    "h21" integer NOT NULL,
    "points" integer NOT NULL,
    "vertices" integer NOT NULL,
    "facets" integer NOT NULL,
    "latticePoints" integer NOT NULL,
    "dualLatticePoints" integer NOT NULL,
    "favourable" boolean NOT NULL,
    "symmetryOrder" integer NOT NULL,
    "weights" text,
    "side" varchar,
    "coordinates" text NOT NULL
  )`,
  `CREATE TABLE "campaign_polytope" (
    "campaignId" varchar NOT NULL,
    "polytopeKey" varchar NOT NULL,
    "name" varchar NOT NULL,
    "authorId" varchar NOT NULL,
    "createdAt" varchar NOT NULL,
    CONSTRAINT "FK_5d61f149f0049336e5d6ba2ee71" FOREIGN KEY ("campaignId") REFERENCES "campaign" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_28ee74eb5e600644fc5f575eec0" FOREIGN KEY ("polytopeKey") REFERENCES "polytope" ("key") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_2d7c6184c9d71532818814964c6" FOREIGN KEY ("authorId") REFERENCES "account" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION,
    PRIMARY KEY ("campaignId", "polytopeKey")
  )`,
  `CREATE TABLE "candidate" (
    "key" varchar PRIMARY KEY NOT NULL,
    "polytopeKey" varchar NOT NULL,
    "heights" text NOT NULL,
    CONSTRAINT "FK_f25ae16694e00973b8fed3ea920" FOREIGN KEY ("polytopeKey") REFERENCES "polytope" ("key") ON DELETE NO ACTION ON UPDATE NO ACTION
  )`,
  `CREATE TABLE "candidate_value" (
    "candidateKey" varchar NOT NULL,
    "scoringHash" varchar NOT NULL,
    "outcome" text NOT NULL,
    CONSTRAINT "FK_446af542fc64b4551e5a2eebc41" FOREIGN KEY ("candidateKey") REFERENCES "candidate" ("key") ON DELETE CASCADE ON UPDATE NO ACTION,
    PRIMARY KEY ("candidateKey", "scoringHash")
  )`,
  `CREATE TABLE "target" (
    "id" varchar PRIMARY KEY NOT NULL,
    "campaignId" varchar NOT NULL,
    "name" varchar NOT NULL,
    "createdAt" varchar NOT NULL,
    CONSTRAINT "FK_9f62c1607dbbc9913d26841d245" FOREIGN KEY ("campaignId") REFERENCES "campaign" ("id") ON DELETE CASCADE ON UPDATE NO ACTION
  )`,
  `CREATE TABLE "target_version" (
    "id" varchar PRIMARY KEY NOT NULL,
    "targetId" varchar NOT NULL,
    "number" integer NOT NULL,
    "text" text NOT NULL,
    "scoringHash" varchar NOT NULL,
    "authorId" varchar NOT NULL,
    "createdAt" varchar NOT NULL,
    CONSTRAINT "UQ_6341b3d8b6dab8d16dc95cac79d" UNIQUE ("targetId", "number"),
    CONSTRAINT "FK_0a57cec7b30d750223d85481b90" FOREIGN KEY ("targetId") REFERENCES "target" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_6ee9a5bf5f14613bc6bb5d78e42" FOREIGN KEY ("authorId") REFERENCES "account" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION
  )`,
  `CREATE TABLE "search" (
    "id" varchar PRIMARY KEY NOT NULL,
    "campaignId" varchar NOT NULL,
    "targetVersionId" varchar NOT NULL,
    "name" varchar NOT NULL,
    "method" varchar NOT NULL,
    "scope" text NOT NULL,
    "polytopeKeys" text NOT NULL,
    "scopeHash" varchar NOT NULL,
    "budget" integer NOT NULL,
    "seed" integer NOT NULL,
    "islands" integer NOT NULL,
    "keep" integer NOT NULL,
    "scoringHash" varchar NOT NULL,
    "engineVersion" varchar NOT NULL,
    "state" varchar NOT NULL,
    "failureCode" varchar,
    "failureMessage" text,
    "progress" text NOT NULL,
    "evaluations" integer NOT NULL,
    "best" real,
    "workMilliseconds" integer NOT NULL,
    "leaseOwner" varchar,
    "leaseUntil" integer,
    "authorId" varchar NOT NULL,
    "createdAt" varchar NOT NULL,
    "finishedAt" varchar,
    CONSTRAINT "FK_d36b5ce43a46471f2e308d53a35" FOREIGN KEY ("campaignId") REFERENCES "campaign" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_c06c057945db38922cfdfc29bae" FOREIGN KEY ("targetVersionId") REFERENCES "target_version" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_39ebf9b75b8fc81d9f81f261e93" FOREIGN KEY ("authorId") REFERENCES "account" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION
  )`,
  `CREATE TABLE "find" (
    "searchId" varchar NOT NULL,
    "candidateKey" varchar NOT NULL,
    "rank" integer NOT NULL,
    "island" integer NOT NULL,
    CONSTRAINT "FK_4d825f9e5bf0d98565755e05d93" FOREIGN KEY ("searchId") REFERENCES "search" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_04971aa786e9b974b675b9dfa85" FOREIGN KEY ("candidateKey") REFERENCES "candidate" ("key") ON DELETE NO ACTION ON UPDATE NO ACTION,
    PRIMARY KEY ("searchId", "candidateKey")
  )`,
  `CREATE TABLE "library_file" (
    "name" varchar PRIMARY KEY NOT NULL,
    "digest" varchar NOT NULL,
    "loaded" integer NOT NULL,
    "total" integer NOT NULL
  )`,
  `CREATE TABLE "membership" (
    "campaignId" varchar NOT NULL,
    "accountId" varchar NOT NULL,
    "role" varchar NOT NULL,
    CONSTRAINT "FK_b946960917b46b2bd9b54ca9057" FOREIGN KEY ("campaignId") REFERENCES "campaign" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_7df4a02f7635e6571ba76167002" FOREIGN KEY ("accountId") REFERENCES "account" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    PRIMARY KEY ("campaignId", "accountId")
  )`,
  `CREATE TABLE "null_sample" (
    "id" varchar PRIMARY KEY NOT NULL,
    "scopeHash" varchar NOT NULL,
    "scoringHash" varchar NOT NULL,
    "seed" integer NOT NULL,
    "size" integer NOT NULL,
    "complete" boolean NOT NULL,
    "state" text,
    "summary" text,
    "failure" text,
    CONSTRAINT "UQ_404360069496af1c29c0a8c5fec" UNIQUE ("scopeHash", "scoringHash")
  )`,
  `CREATE TABLE "search_island" (
    "searchId" varchar NOT NULL,
    "number" integer NOT NULL,
    "segment" integer NOT NULL,
    "state" text,
    "progress" text,
    "done" boolean NOT NULL,
    CONSTRAINT "FK_3b06cff416a704f3851b86383eb" FOREIGN KEY ("searchId") REFERENCES "search" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    PRIMARY KEY ("searchId", "number")
  )`,
  `CREATE TABLE "set_up_link" (
    "tokenHash" varchar PRIMARY KEY NOT NULL,
    "accountId" varchar NOT NULL,
    "expiresAt" varchar NOT NULL,
    "usedAt" varchar,
    CONSTRAINT "FK_750639137401da76dc349c09b66" FOREIGN KEY ("accountId") REFERENCES "account" ("id") ON DELETE CASCADE ON UPDATE NO ACTION
  )`,
  `CREATE TABLE "shortlist" (
    "id" varchar PRIMARY KEY NOT NULL,
    "campaignId" varchar NOT NULL,
    "targetVersionId" varchar NOT NULL,
    "name" varchar NOT NULL,
    "searchIds" text NOT NULL,
    "columns" text NOT NULL,
    "scoringHash" varchar NOT NULL,
    "engineVersion" varchar NOT NULL,
    "authorId" varchar NOT NULL,
    "createdAt" varchar NOT NULL,
    CONSTRAINT "FK_572d1adc2d631e0d37564aa2c4e" FOREIGN KEY ("campaignId") REFERENCES "campaign" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_c004c814afaa309f1a572b58f7e" FOREIGN KEY ("targetVersionId") REFERENCES "target_version" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_ced971102eaab35d103002b3620" FOREIGN KEY ("authorId") REFERENCES "account" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION
  )`,
  `CREATE TABLE "shortlist_entry" (
    "shortlistId" varchar NOT NULL,
    "rank" integer NOT NULL,
    "candidateKey" varchar NOT NULL,
    "searchId" varchar NOT NULL,
    "outcome" text NOT NULL,
    CONSTRAINT "FK_4baf96e61e5740ca0ee2aadf1b2" FOREIGN KEY ("shortlistId") REFERENCES "shortlist" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_b5428b072590356d5ece2e06496" FOREIGN KEY ("candidateKey") REFERENCES "candidate" ("key") ON DELETE NO ACTION ON UPDATE NO ACTION,
    CONSTRAINT "FK_eb37fd2598830b4cdf630a55b51" FOREIGN KEY ("searchId") REFERENCES "search" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    PRIMARY KEY ("shortlistId", "rank")
  )`,
  `CREATE TABLE "verdict" (
    "id" integer PRIMARY KEY AUTOINCREMENT NOT NULL,
    "campaignId" varchar NOT NULL,
    "candidateKey" varchar NOT NULL,
    "targetVersionId" varchar NOT NULL,
    "value" varchar NOT NULL,
    "reason" text NOT NULL,
    "override" boolean NOT NULL,
    "authorId" varchar NOT NULL,
    "createdAt" varchar NOT NULL,
    CONSTRAINT "FK_8afea3213ff7494e3d5ff05fa17" FOREIGN KEY ("campaignId") REFERENCES "campaign" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_bc5e6edaa625228d8d95b61f1e6" FOREIGN KEY ("candidateKey") REFERENCES "candidate" ("key") ON DELETE NO ACTION ON UPDATE NO ACTION,
    CONSTRAINT "FK_ed914dfa42be801caab36a45ffb" FOREIGN KEY ("targetVersionId") REFERENCES "target_version" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
    CONSTRAINT "FK_9516dbe09726a38c37545ef39a6" FOREIGN KEY ("authorId") REFERENCES "account" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION
  )`,
]

const indices = [
  `CREATE INDEX "IDX_fc857e6d503f52546c8d15b97b" ON "polytope" ("origin")`,
  `CREATE INDEX "IDX_416eec1b65c6d00e62373ae6ab" ON "polytope" ("h11", "h21")`,
  `CREATE INDEX "IDX_28ee74eb5e600644fc5f575eec" ON "campaign_polytope" ("polytopeKey")`,
  `CREATE INDEX "IDX_f25ae16694e00973b8fed3ea92" ON "candidate" ("polytopeKey")`,
  `CREATE INDEX "IDX_9f62c1607dbbc9913d26841d24" ON "target" ("campaignId")`,
  `CREATE INDEX "IDX_d36b5ce43a46471f2e308d53a3" ON "search" ("campaignId")`,
  `CREATE INDEX "IDX_c06c057945db38922cfdfc29ba" ON "search" ("targetVersionId")`,
  `CREATE INDEX "IDX_ed3339334800611ae59883c365" ON "search" ("state")`,
  `CREATE INDEX "IDX_85bb582123eb46c6317caf7a69" ON "find" ("searchId", "rank")`,
  `CREATE INDEX "IDX_7df4a02f7635e6571ba7616700" ON "membership" ("accountId")`,
  `CREATE INDEX "IDX_750639137401da76dc349c09b6" ON "set_up_link" ("accountId")`,
  `CREATE INDEX "IDX_572d1adc2d631e0d37564aa2c4" ON "shortlist" ("campaignId")`,
  `CREATE INDEX "IDX_b5428b072590356d5ece2e0649" ON "shortlist_entry" ("candidateKey")`,
  `CREATE INDEX "IDX_1ff10ab7b83f66f086fa4ab655" ON "verdict" ("campaignId", "candidateKey")`,
]

/** Dependents first. */
const tableNames = [
  'verdict',
  'shortlist_entry',
  'shortlist',
  'set_up_link',
  'search_island',
  'null_sample',
  'membership',
  'library_file',
  'find',
  'search',
  'target_version',
  'target',
  'candidate_value',
  'candidate',
  'campaign_polytope',
  'polytope',
  'campaign',
  'account',
]

/** The whole schema of the first release. */
export class FirstSchema1796100000000 implements MigrationInterface {
  readonly name = 'FirstSchema1796100000000'

  async up(runner: QueryRunner): Promise<void> {
    for (const statement of [...tables, ...indices]) await runner.query(statement)
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const name of tableNames) await runner.query(`DROP TABLE "${name}"`)
  }
}
