import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { ExternalValue } from '../../shared/externalTables.ts'
import { ExternalTable } from './externalTable.ts'

/** What a table says of one candidate, which need not be stored here. */
@Entity('external_row')
export class ExternalRow {
  @PrimaryColumn({ type: 'varchar' })
  tableId!: string

  @PrimaryColumn({ type: 'varchar' })
  candidateKey!: string

  @ManyToOne(() => ExternalTable, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'tableId' })
  table?: Relation<ExternalTable>

  /** One per column of the table; null for an empty cell. */
  @Column({ type: 'simple-json' })
  values!: (ExternalValue | null)[]
}
