import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { CandidateRecord } from './candidate.ts'
import { CertificateRecord } from './certificate.ts'
import { Certification } from './certification.ts'

/** `broken`: the computation itself went wrong, and no certificate came of it. */
export type CertificationTaskState = 'waiting' | 'passed' | 'failed' | 'broken'

/** One candidate of a request. */
@Entity('certification_task')
export class CertificationTask {
  @PrimaryColumn({ type: 'varchar' })
  certificationId!: string

  /** From 0: the order of work. */
  @PrimaryColumn({ type: 'integer' })
  place!: number

  @ManyToOne(() => Certification, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'certificationId' })
  certification?: Relation<Certification>

  @Index()
  @Column({ type: 'varchar' })
  candidateKey!: string

  @ManyToOne(() => CandidateRecord, { nullable: false })
  @JoinColumn({ name: 'candidateKey' })
  candidate?: Relation<CandidateRecord>

  @Column({ type: 'varchar' })
  state!: CertificationTaskState

  @Column({ type: 'varchar', nullable: true })
  certificateId!: string | null

  @ManyToOne(() => CertificateRecord, { onDelete: 'CASCADE', nullable: true })
  @JoinColumn({ name: 'certificateId' })
  certificate?: Relation<CertificateRecord> | null

  /** Why it broke, in words for people. */
  @Column({ type: 'text', nullable: true })
  failure!: string | null
}
