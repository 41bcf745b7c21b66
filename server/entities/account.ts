import { Column, Entity, PrimaryColumn } from 'typeorm'

/** A person who may sign in. `passwordHash` is null until the set-up link has been used. */
@Entity('account')
export class Account {
  @PrimaryColumn({ type: 'varchar' })
  id!: string

  /** Lower case. */
  @Column({ type: 'varchar', unique: true })
  email!: string

  @Column({ type: 'varchar' })
  name!: string

  /** argon2id, with its parameters inside the string. */
  @Column({ type: 'varchar', nullable: true })
  passwordHash!: string | null

  /** Invented account of the first start: the server then listens on loopback only. */
  @Column({ type: 'boolean', default: false })
  demo!: boolean

  @Column({ type: 'varchar' })
  createdAt!: string
}
