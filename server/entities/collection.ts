import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { Account } from './account.ts'
import { Campaign } from './campaign.ts'

/** A campaign's named set of polytopes. Published, everybody may read it, and see the imports it holds. */
@Entity('collection')
export class Collection {
  @PrimaryColumn({ type: 'varchar' })
  id!: string

  @Index()
  @Column({ type: 'varchar' })
  campaignId!: string

  @ManyToOne(() => Campaign, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'campaignId' })
  campaign?: Relation<Campaign>

  @Column({ type: 'varchar' })
  name!: string

  @Column({ type: 'text' })
  description!: string

  @Column({ type: 'varchar' })
  authorId!: string

  @ManyToOne(() => Account, { nullable: false })
  @JoinColumn({ name: 'authorId' })
  author?: Relation<Account>

  @Column({ type: 'varchar' })
  createdAt!: string

  /** null: for the campaign's members only. */
  @Index()
  @Column({ type: 'varchar', nullable: true })
  publishedAt!: string | null
}
