import { Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { Collection } from './collection.ts'
import { PolytopeRecord } from './polytope.ts'

/** A polytope's place in a collection. */
@Entity('collection_polytope')
export class CollectionPolytope {
  @PrimaryColumn({ type: 'varchar' })
  collectionId!: string

  @Index()
  @PrimaryColumn({ type: 'varchar' })
  polytopeKey!: string

  @ManyToOne(() => Collection, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'collectionId' })
  collection?: Relation<Collection>

  @ManyToOne(() => PolytopeRecord, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'polytopeKey' })
  polytope?: Relation<PolytopeRecord>
}
