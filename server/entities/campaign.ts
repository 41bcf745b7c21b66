import { Column, Entity, PrimaryColumn } from 'typeorm'

/** A team's hunt. */
@Entity('campaign')
export class Campaign {
  @PrimaryColumn({ type: 'varchar' })
  id!: string

  @Column({ type: 'varchar' })
  name!: string

  @Column({ type: 'text' })
  description!: string

  @Column({ type: 'varchar' })
  createdAt!: string

  /** Whether "verified" needs two people from now on. */
  @Column({ type: 'boolean', default: false })
  secondReader!: boolean
}
