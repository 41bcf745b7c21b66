import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { Account } from './account.ts'

/** One-time link with which a new account chooses its password. Only the token's hash is stored. */
@Entity('set_up_link')
export class SetUpLink {
  /** SHA-256 of the token, hexadecimal. */
  @PrimaryColumn({ type: 'varchar' })
  tokenHash!: string

  @Index()
  @Column({ type: 'varchar' })
  accountId!: string

  @ManyToOne(() => Account, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'accountId' })
  account?: Relation<Account>

  @Column({ type: 'varchar' })
  expiresAt!: string

  @Column({ type: 'varchar', nullable: true })
  usedAt!: string | null
}
