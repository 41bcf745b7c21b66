import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { Account } from './account.ts'
import { Campaign } from './campaign.ts'
import { PolytopeRecord } from './polytope.ts'

/** A polytope that a campaign imported, under the campaign's own name for it. */
@Entity('campaign_polytope')
export class CampaignPolytope {
  @PrimaryColumn({ type: 'varchar' })
  campaignId!: string

  @Index()
  @PrimaryColumn({ type: 'varchar' })
  polytopeKey!: string

  @ManyToOne(() => Campaign, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'campaignId' })
  campaign?: Relation<Campaign>

  @ManyToOne(() => PolytopeRecord, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'polytopeKey' })
  polytope?: Relation<PolytopeRecord>

  @Column({ type: 'varchar' })
  name!: string

  @Column({ type: 'varchar' })
  authorId!: string

  @ManyToOne(() => Account, { nullable: false })
  @JoinColumn({ name: 'authorId' })
  author?: Relation<Account>

  @Column({ type: 'varchar' })
  createdAt!: string
}
