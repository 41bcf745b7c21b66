import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { Account } from './account.ts'
import { Comment } from './comment.ts'

/** A member named in a comment. */
@Entity('mention')
@Index(['accountId', 'seenAt'])
export class Mention {
  @PrimaryColumn({ type: 'integer' })
  commentId!: number

  @ManyToOne(() => Comment, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'commentId' })
  comment?: Relation<Comment>

  @PrimaryColumn({ type: 'varchar' })
  accountId!: string

  @ManyToOne(() => Account, { nullable: false })
  @JoinColumn({ name: 'accountId' })
  account?: Relation<Account>

  /** null: it waits for the person. */
  @Column({ type: 'varchar', nullable: true })
  seenAt!: string | null
}
