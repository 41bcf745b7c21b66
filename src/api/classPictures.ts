import { queryOptions } from '@tanstack/react-query'
import { z } from 'zod'
import { classPictureSchema, classPicturesLimit, type ClassPicture } from '../../shared/candidates.ts'
import { request } from './request.ts'

interface Waiting {
  readonly key: string
  readonly resolve: (picture: ClassPicture) => void
  readonly reject: (error: unknown) => void
}

let waiting: Waiting[] = []

/** Pictures wanted in one turn of the event loop (the rows of a table) travel in as few requests as may be. */
function wanted(key: string): Promise<ClassPicture> {
  return new Promise((resolve, reject) => {
    if (waiting.length === 0) setTimeout(fetchWaiting, 0)
    waiting.push({ key, resolve, reject })
  })
}

function fetchWaiting(): void {
  const all = waiting
  waiting = []
  for (let from = 0; from < all.length; from += classPicturesLimit) {
    void fetchBatch(all.slice(from, from + classPicturesLimit))
  }
}

async function fetchBatch(batch: readonly Waiting[]): Promise<void> {
  try {
    const pictures = await request('/candidates/pictures', {
      query: { keys: batch.map(({ key }) => key).join(',') },
      schema: z.array(classPictureSchema),
    })
    const byKey = new Map(pictures.map((picture) => [picture.key, picture]))
    for (const { key, resolve, reject } of batch) {
      const picture = byKey.get(key)
      if (picture) resolve(picture)
      else reject(new Error(`There is no picture of candidate ${key}.`))
    }
  } catch (error) {
    for (const { reject } of batch) reject(error)
  }
}

/** The largest 2-faces of a candidate, for a small picture. A function of its key alone. */
export const classPictureQuery = (key: string) =>
  queryOptions({
    queryKey: ['class-picture', key] as const,
    queryFn: () => wanted(key),
    staleTime: Infinity,
    retry: false,
  })
