import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { Account } from './account.ts'
import { Campaign } from './campaign.ts'
import { Target } from './target.ts'

/** Who is to give a verdict on a candidate for a target; like verdicts, the same in every list of the target. */
@Entity('assignment')
@Index(['campaignId', 'reviewerId'])
export class Assignment {
  @PrimaryColumn({ type: 'varchar' })
  targetId!: string

  @ManyToOne(() => Target, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'targetId' })
  target?: Relation<Target>

  @PrimaryColumn({ type: 'varchar' })
  candidateKey!: string

  @Column({ type: 'varchar' })
  campaignId!: string

  @ManyToOne(() => Campaign, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'campaignId' })
  campaign?: Relation<Campaign>

  @Column({ type: 'varchar' })
  reviewerId!: string

  @ManyToOne(() => Account, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'reviewerId' })
  reviewer?: Relation<Account>

  /** Who handed it over. */
  @Column({ type: 'varchar' })
  authorId!: string

  @Column({ type: 'varchar' })
  createdAt!: string
}
