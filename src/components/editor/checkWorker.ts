import { reportOnRule } from '../../../scoring/index.ts'

/** A rule of 200 lines takes tens of milliseconds to check: not on the thread that draws what is typed. */
self.addEventListener('message', ({ data }: MessageEvent<string>) => {
  self.postMessage(reportOnRule(data))
})
