import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { PolytopeRecord } from './polytope.ts'

/** A geometry: a polytope with a 2-face class, stored once. Heights are the witness of regularity. */
@Entity('candidate')
export class CandidateRecord {
  /** 32 hexadecimal digits, the permanent address. */
  @PrimaryColumn({ type: 'varchar' })
  key!: string

  @Index()
  @Column({ type: 'varchar' })
  polytopeKey!: string

  @ManyToOne(() => PolytopeRecord, { nullable: false })
  @JoinColumn({ name: 'polytopeKey' })
  polytope?: Relation<PolytopeRecord>

  /** Integer heights on the normal form's points, in their fixed order. */
  @Column({ type: 'simple-json' })
  heights!: number[]
}
