import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { OutcomeView } from '../../shared/outcomes.ts'
import { CandidateRecord } from './candidate.ts'

/** What a rule says of a candidate. Re-used only under the same scoring hash. */
@Entity('candidate_value')
export class CandidateValue {
  @PrimaryColumn({ type: 'varchar' })
  candidateKey!: string

  @PrimaryColumn({ type: 'varchar' })
  scoringHash!: string

  @ManyToOne(() => CandidateRecord, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'candidateKey' })
  candidate?: Relation<CandidateRecord>

  @Column({ type: 'simple-json' })
  outcome!: OutcomeView
}
