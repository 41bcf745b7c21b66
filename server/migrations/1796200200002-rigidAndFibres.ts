import { type MigrationInterface, type QueryRunner } from 'typeorm'

const columns = [
  ['rigidComponents', 'integer'],
  ['rigidRank', 'integer'],
  ['fibreTypes', 'varchar'],
] as const

/** Rigid divisors' components and rank, and the types of a polytope's reflexive polygons. */
export class RigidAndFibres1796200200002 implements MigrationInterface {
  readonly name = 'RigidAndFibres1796200200002'

  async up(runner: QueryRunner): Promise<void> {
    for (const [name, type] of columns)
      await runner.query(`ALTER TABLE "polytope" ADD COLUMN "${name}" ${type}`)
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const [name] of columns) await runner.query(`ALTER TABLE "polytope" DROP COLUMN "${name}"`)
  }
}
