import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { Scope } from '../../shared/polytopes.ts'
import type { SearchProgress, SearchState } from '../../shared/searches.ts'
import type { NullSummary } from '../../shared/nullSamples.ts'
import type { ImportedResult, MethodSettings, StartsFrom } from '../../shared/searchRunning.ts'
import { Account } from './account.ts'
import { Campaign } from './campaign.ts'
import { TargetVersion } from './targetVersion.ts'

/** A run of a method over a scope for a target version. */
@Entity('search')
export class Search {
  @PrimaryColumn({ type: 'varchar' })
  id!: string

  @Index()
  @Column({ type: 'varchar' })
  campaignId!: string

  @ManyToOne(() => Campaign, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'campaignId' })
  campaign?: Relation<Campaign>

  @Index()
  @Column({ type: 'varchar' })
  targetVersionId!: string

  @ManyToOne(() => TargetVersion, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'targetVersionId' })
  targetVersion?: Relation<TargetVersion>

  @Column({ type: 'varchar' })
  name!: string

  @Column({ type: 'varchar' })
  method!: string

  /** As it was asked for. */
  @Column({ type: 'simple-json' })
  scope!: Scope

  /** The polytopes the scope held when the search was made, by key: what the search really runs over. */
  @Column({ type: 'simple-json' })
  polytopeKeys!: string[]

  /** Hash of `polytopeKeys`: with the scoring hash, the address of the null sample. */
  @Column({ type: 'varchar' })
  scopeHash!: string

  /** With all extensions. */
  @Column({ type: 'integer' })
  budget!: number

  /** Budgets added since it was made, in order; they are part of what the result depends on. */
  @Column({ type: 'simple-json', default: '[]' })
  extensions!: number[]

  /** Settings of the method that were chosen; for the others the engine's own hold. */
  @Column({ type: 'simple-json', default: '{}' })
  settings!: MethodSettings

  /** Where the candidates it begins from are from; null: it begins by itself. */
  @Column({ type: 'simple-json', nullable: true })
  startsFrom!: StartsFrom | null

  /** Set where it was run elsewhere and its result imported, with the null sample that the result reports. */
  @Column({ type: 'simple-json', nullable: true })
  imported!: (ImportedResult & { null: NullSummary | null }) | null

  @Column({ type: 'integer' })
  seed!: number

  @Column({ type: 'integer' })
  islands!: number

  @Column({ type: 'integer' })
  keep!: number

  /** Whether a surrogate chooses among proposals; it had no say in searches made before there was one. */
  @Column({ type: 'boolean', default: false })
  surrogate!: boolean

  @Column({ type: 'varchar' })
  scoringHash!: string

  @Column({ type: 'varchar' })
  engineVersion!: string

  @Index()
  @Column({ type: 'varchar' })
  state!: SearchState

  @Column({ type: 'varchar', nullable: true })
  failureCode!: string | null

  @Column({ type: 'text', nullable: true })
  failureMessage!: string | null

  @Column({ type: 'simple-json' })
  progress!: SearchProgress

  /** Copies of two fields of `progress`, for lists. */
  @Column({ type: 'integer' })
  evaluations!: number

  @Column({ type: 'real', nullable: true })
  best!: number | null

  /** Milliseconds of worker time over all committed segments. */
  @Column({ type: 'integer' })
  workMilliseconds!: number

  /** The process that runs it, and a number that changes while it lives. */
  @Column({ type: 'varchar', nullable: true })
  leaseOwner!: string | null

  @Column({ type: 'integer', nullable: true })
  leaseBeat!: number | null

  @Column({ type: 'varchar' })
  authorId!: string

  @ManyToOne(() => Account, { nullable: false })
  @JoinColumn({ name: 'authorId' })
  author?: Relation<Account>

  @Column({ type: 'varchar' })
  createdAt!: string

  @Column({ type: 'varchar', nullable: true })
  finishedAt!: string | null
}
