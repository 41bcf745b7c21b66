import { BaseSequencer, type TestSpecification } from 'vitest/node'

/** Files that take longest, in a browser or in processes of their own: begun last, they would leave one core idle. */
const longest = /tests\/(browser\/|server\/(recovery|responsiveness|faults\/threads)\.test)/

/** The usual order, with the longest files before it. */
export default class LongestFirst extends BaseSequencer {
  override async sort(files: TestSpecification[]): Promise<TestSpecification[]> {
    const sorted = await super.sort(files)
    const isLong = ({ moduleId }: TestSpecification) => longest.test(moduleId)
    return [...sorted.filter(isLong), ...sorted.filter((file) => !isLong(file))]
  }
}
