import { fileURLToPath } from 'node:url'
import { ESLint } from 'eslint'
import { describe, expect, it } from 'vitest'

const root = fileURLToPath(new URL('../../../', import.meta.url))
const eslint = new ESLint({ cwd: root })

/** Lint messages about imports for one line of code in a file of the independent road. */
async function complaints(line: string, file = 'scoring/certify/example.ts'): Promise<number> {
  const [result] = await eslint.lintText(`${line}\n`, { filePath: `${root}${file}` })
  return result.messages.filter(({ ruleId }) => /^no-restricted-(imports|syntax)$/.test(ruleId ?? '')).length
}

describe('the independent road', () => {
  it('may import its own files, errors.ts and packages', async () => {
    for (const from of ['./facets.ts', '../errors.ts', 'ml-matrix', '@noble/hashes/sha2.js']) {
      expect([from, await complaints(`import * as x from '${from}'`)]).toEqual([from, 0])
    }
  })

  it('may not import the fast road in any way', async () => {
    const paths = [
      '../geometry/polytope.ts',
      '../geometry/../geometry/polytope.ts',
      './../geometry/polytope.ts',
      '../observables/registry.ts',
      '../search/advance.ts',
      '../rules/index.ts',
      '../index.ts',
      '../evaluation.ts',
      '../../scoring/geometry/polytope.ts',
      'scoring/geometry/polytope.ts',
      '/scoring/geometry/polytope.ts',
      'node:fs',
      'node:module',
    ]
    for (const from of paths) {
      for (const line of [
        `import { x } from '${from}'`,
        `import type { X } from '${from}'`,
        `import '${from}'`,
        `export * from '${from}'`,
        `export const x = import('${from}')`,
      ]) {
        expect([line, await complaints(line)]).toEqual([line, 1])
      }
    }
  })
})
