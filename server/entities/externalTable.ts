import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { ExternalTable as ExternalTableView } from '../../shared/externalTables.ts'
import { Account } from './account.ts'
import { Campaign } from './campaign.ts'
import { Shortlist } from './shortlist.ts'

/** A table of columns that a person brought along, keyed by candidate. Lists show it; no rule can read it. */
@Entity('external_table')
export class ExternalTable {
  @PrimaryColumn({ type: 'varchar' })
  id!: string

  @Index()
  @Column({ type: 'varchar' })
  campaignId!: string

  @ManyToOne(() => Campaign, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'campaignId' })
  campaign?: Relation<Campaign>

  /** null: every list of the campaign shows it. */
  @Column({ type: 'varchar', nullable: true })
  shortlistId!: string | null

  @ManyToOne(() => Shortlist, { onDelete: 'CASCADE', nullable: true })
  @JoinColumn({ name: 'shortlistId' })
  shortlist?: Relation<Shortlist> | null

  @Column({ type: 'varchar' })
  name!: string

  @Column({ type: 'simple-json' })
  columns!: ExternalTableView['columns']

  @Column({ type: 'integer' })
  rowCount!: number

  @Column({ type: 'varchar' })
  authorId!: string

  @ManyToOne(() => Account, { nullable: false })
  @JoinColumn({ name: 'authorId' })
  author?: Relation<Account>

  @Column({ type: 'varchar' })
  createdAt!: string
}
