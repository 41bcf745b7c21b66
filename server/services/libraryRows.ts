import type { EntityManager } from 'typeorm'
import { LibraryFile } from '../entities/libraryFile.ts'
import { PolytopeRecord } from '../entities/polytope.ts'
import type { PolytopeFacts } from '../jobs/compute/polytopeFacts.ts'
import type { BundledFile, BundledPolytope } from '../library/bundled.ts'

/** How many polytopes of a bundled file are in the database already; a changed file starts again. */
export async function loadedOf(manager: EntityManager, file: BundledFile): Promise<number> {
  const row = await manager.findOneBy(LibraryFile, { name: file.name })
  return row?.digest === file.digest ? row.loaded : 0
}

/**
 * Stores a stretch of a bundled file and how far it goes. A polytope may stand in two files, or have been
 * imported before: it is then one and the same row, bundled from now on.
 */
export async function storeBundled(
  manager: EntityManager,
  file: BundledFile,
  stretch: readonly { readonly source: BundledPolytope; readonly facts: PolytopeFacts }[],
  loaded: number,
): Promise<void> {
  for (const { source, facts } of stretch) {
    const known = await manager.findOneBy(PolytopeRecord, { key: facts.key })
    const weights = source.weights ?? known?.weights ?? null
    const side = source.side ?? known?.side ?? null
    if (known === null) {
      await manager.insert(PolytopeRecord, { ...facts, name: source.id, origin: 'bundled', weights, side })
    } else {
      const name = known.origin === 'bundled' ? known.name : source.id
      await manager.update(PolytopeRecord, { key: facts.key }, { name, origin: 'bundled', weights, side })
    }
  }
  await manager.upsert(
    LibraryFile,
    { name: file.name, digest: file.digest, loaded, total: file.polytopes.length },
    ['name'],
  )
}
