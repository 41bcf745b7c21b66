import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { WallInvariantsView } from '../../shared/relatives.ts'
import { CandidateRecord } from './candidate.ts'

/** Basis-independent integers of a candidate and their key. A row of an older version counts as missing. */
@Entity('candidate_invariants')
@Index(['h11', 'h21'])
export class CandidateInvariants {
  @PrimaryColumn({ type: 'varchar' })
  candidateKey!: string

  @ManyToOne(() => CandidateRecord, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'candidateKey' })
  candidate?: Relation<CandidateRecord>

  @Index()
  @Column({ type: 'varchar' })
  wallKey!: string

  @Column({ type: 'integer' })
  version!: number

  @Column({ type: 'integer' })
  h11!: number

  @Column({ type: 'integer' })
  h21!: number

  @Column({ type: 'simple-json' })
  invariants!: WallInvariantsView
}
