import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { Cell } from '../../shared/outcomes.ts'
import { ExploredColumn } from './exploredColumn.ts'

/** A piece of a column, as it was computed in one go. */
@Entity('explored_cells')
export class ExploredCells {
  @PrimaryColumn({ type: 'varchar' })
  columnId!: string

  /** Place of the candidate that the first cell is of. */
  @PrimaryColumn({ type: 'integer' })
  first!: number

  @ManyToOne(() => ExploredColumn, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'columnId' })
  column?: Relation<ExploredColumn>

  @Column({ type: 'simple-json' })
  cells!: Cell[]
}
