import { join } from 'node:path'
import { openDataSource } from '../../../server/data-source.ts'
import { Search } from '../../../server/entities/search.ts'
import { topFinds } from '../../../server/services/finds.ts'

/** All that the one search of a data folder has left behind, but for what depends on the time it took. */
export async function leftBehind(folder: string) {
  const source = await openDataSource(join(folder, 'tessellary.sqlite'))
  try {
    const done = await source.manager.findOneByOrFail(Search, {})
    const finds = await topFinds(source.manager, done, done.keep)
    const [{ integrity_check: integrity }] =
      await source.query<{ integrity_check: string }[]>('PRAGMA integrity_check')
    return {
      state: done.state,
      integrity,
      progress: { ...done.progress, evaluationsPerSecond: null, secondsLeft: null },
      finds: finds.map(({ candidateKey, outcome }) => ({ candidateKey, outcome })),
    }
  } finally {
    await source.destroy()
  }
}
