import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, Unique, type Relation } from 'typeorm'
import { Account } from './account.ts'
import { Target } from './target.ts'

/** One text of a target. Never edited: an edit is a new version. */
@Entity('target_version')
@Unique(['targetId', 'number'])
export class TargetVersion {
  @PrimaryColumn({ type: 'varchar' })
  id!: string

  @Column({ type: 'varchar' })
  targetId!: string

  @ManyToOne(() => Target, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'targetId' })
  target?: Relation<Target>

  @Column({ type: 'integer' })
  number!: number

  @Column({ type: 'text' })
  text!: string

  /** Of the engine that checked it; a search records the one it ran with. */
  @Column({ type: 'varchar' })
  scoringHash!: string

  @Column({ type: 'varchar' })
  authorId!: string

  @ManyToOne(() => Account, { nullable: false })
  @JoinColumn({ name: 'authorId' })
  author?: Relation<Account>

  @Column({ type: 'varchar' })
  createdAt!: string
}
