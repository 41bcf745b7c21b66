import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { Role } from '../../shared/roles.ts'
import { Account } from './account.ts'
import { Campaign } from './campaign.ts'

/** An account's role in a campaign. */
@Entity('membership')
export class Membership {
  @PrimaryColumn({ type: 'varchar' })
  campaignId!: string

  @Index()
  @PrimaryColumn({ type: 'varchar' })
  accountId!: string

  @ManyToOne(() => Campaign, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'campaignId' })
  campaign?: Relation<Campaign>

  @ManyToOne(() => Account, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'accountId' })
  account?: Relation<Account>

  @Column({ type: 'varchar' })
  role!: Role
}
