import { Column, Entity, PrimaryColumn } from 'typeorm'

/** How far a bundled file has been loaded, so that a start after an interrupted one continues. */
@Entity('library_file')
export class LibraryFile {
  @PrimaryColumn({ type: 'varchar' })
  name!: string

  /** SHA-256 of the file; another digest starts the file again. */
  @Column({ type: 'varchar' })
  digest!: string

  @Column({ type: 'integer' })
  loaded!: number

  @Column({ type: 'integer' })
  total!: number
}
