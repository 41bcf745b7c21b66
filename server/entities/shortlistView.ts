import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { Account } from './account.ts'
import { Campaign } from './campaign.ts'
import { Shortlist } from './shortlist.ts'

/** Filters, order and columns of a shortlist's table under a name, for all members. */
@Entity('shortlist_view')
export class ShortlistView {
  @PrimaryColumn({ type: 'varchar' })
  id!: string

  @Index()
  @Column({ type: 'varchar' })
  campaignId!: string

  @ManyToOne(() => Campaign, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'campaignId' })
  campaign?: Relation<Campaign>

  /** null: for every list of the campaign. */
  @Column({ type: 'varchar', nullable: true })
  shortlistId!: string | null

  @ManyToOne(() => Shortlist, { onDelete: 'CASCADE', nullable: true })
  @JoinColumn({ name: 'shortlistId' })
  shortlist?: Relation<Shortlist> | null

  @Column({ type: 'varchar' })
  name!: string

  /** Parts of the page's address. */
  @Column({ type: 'text' })
  address!: string

  @Column({ type: 'varchar' })
  authorId!: string

  @ManyToOne(() => Account, { nullable: false })
  @JoinColumn({ name: 'authorId' })
  author?: Relation<Account>

  @Column({ type: 'varchar' })
  createdAt!: string
}
