import { describe, expect, it } from 'vitest'
import { parsePointBlocks } from '../../../scoring/geometry/pointBlocks.ts'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import { bundled } from './bundled.ts'
import { quintic } from './unimodular.ts'

const asRows = quintic.map((row) => row.join(' ')).join('\n')
const asColumns = [0, 1, 2, 3].map((axis) => quintic.map((row) => row[axis]).join(' ')).join('\n')
const problemsOf = (text: string): [number, string][] =>
  parsePointBlocks(text).problems.map(({ line, code }) => [line, code])

describe('parsePointBlocks', () => {
  it.each([
    ['rows', asRows],
    ['columns', asColumns],
    ['rows with a heading', `a quintic, found by hand\n${asRows}`],
    ['columns with their shape', `4 5\n${asColumns}`],
    ['a heading with numbers', `4 5 some more 1,101 [-200]\n${asColumns}`],
    ['a heading apart', `quintic\n\n${asRows}`],
    ['commas', asRows.replaceAll(' ', ', ')],
    ['tabs', asRows.replaceAll(' ', '\t')],
    ['a bracket around each row', asRows.replace(/^.*$/gm, '[$&],')],
    ['round brackets', asRows.replaceAll(' ', ',').replace(/^.*$/gm, '($&)')],
    ['all rows on a line', quintic.map((row) => `(${row.join()})`).join(', ')],
    ['semicolons between rows', quintic.map((row) => row.join(' ')).join('; ')],
    ['a list of rows', JSON.stringify(quintic)],
    ['a list of rows over several lines', JSON.stringify(quintic, null, 2)],
    ['a list with a name', `vertices = ${JSON.stringify(quintic)};`],
    ['a list inside an object', `{"id":"a","vertices":${JSON.stringify(quintic)},"h11":1}`],
    ['braces', JSON.stringify(quintic).replaceAll('[', '{').replaceAll(']', '}')],
    ['a matrix in brackets', `P = [${asRows}]`],
    ['comments', `# a polytope\n${asRows.replace(/$/gm, ' # a vertex')}\n// the end`],
    ['line ends of another system', asRows.replaceAll('\n', '\r\n')],
    ['a typographical minus and a plus', asRows.replaceAll('-', '\u2212').replace('1', '+1')],
    ['whole numbers with a point', asRows.replace('1', '1.0')],
    ['a byte order mark', `\uFEFF${asRows}`],
  ])('reads %s', (_, text) => {
    const { polytopes, problems } = parsePointBlocks(text)
    expect(problems).toEqual([])
    expect(polytopes.map(({ rows }) => rows.map((row) => row.map((x) => x + 0)))).toEqual([quintic])
  })

  it('reads several blocks, one after the other, and says on which lines they begin', () => {
    const text = [
      asRows,
      '',
      `4 5\n${asColumns}`,
      'next',
      asRows,
      '',
      JSON.stringify([quintic, quintic]),
    ].join('\n')
    const { polytopes, problems } = parsePointBlocks(text)
    expect(problems).toEqual([])
    expect(polytopes.map(({ line }) => line)).toEqual([1, 8, 13, 19, 19])
    for (const { rows } of polytopes) expect(rows).toEqual(quintic)
    const shapes = parsePointBlocks(`4 5\n${asColumns}\n4 5\n${asColumns}`)
    expect(shapes.polytopes.map(({ line }) => line)).toEqual([2, 7])
  })

  it('reads 4 x 4 as rows, and hands on points that make no polytope', () => {
    const { polytopes } = parsePointBlocks('1 2 3 4\n5 6 7 8\n9 10 11 12\n13 14 15 16\n\n1 0 0 0')
    expect(polytopes.map(({ rows }) => [rows.length, rows[0]])).toEqual([
      [4, [1, 2, 3, 4]],
      [1, [1, 0, 0, 0]],
    ])
  })

  it.each([
    ['an entry that is no integer', asRows.replace('0 1 0 0', '0 x 0 0'), [[2, 'blocks.not-integers']]],
    ['a fraction in the first row', asRows.replace('1 0 0 0', '1.5 0 0 0'), [[1, 'blocks.not-integers']]],
    ['a row that is too short', asRows.replace('0 0 1 0', '0 0 1'), [[3, 'blocks.ragged']]],
    ['a first row that is too short', asRows.replace('1 0 0 0', '1 0 0'), [[2, 'blocks.ragged']]],
    ['a row of two', asRows.replace('0 0 1 0', '0 0'), [[3, 'blocks.ragged']]],
    ['three columns', '1 0 0\n0 1 0\n0 0 1\n-1 -1 -1\n1 1 1', [[1, 'blocks.wrong-shape']]],
    ['three rows', '1 0 0 0 1\n0 1 0 0 1\n0 0 1 0 1', [[1, 'blocks.wrong-shape']]],
    ['text without a matrix', 'nothing here', [[1, 'blocks.no-matrix']]],
    ['two headings for one matrix', `one\n\ntwo\n${asRows}`, [[1, 'blocks.no-matrix']]],
    ['a list that stays open', `[[1,0,0,0],[0,1,0,0]\n\n${asRows}`, [[1, 'blocks.open-bracket']]],
    [
      'a list that stays open before another',
      `[[1,0,0,0],[0,1,0,0]\n[[1,0,0,0]]`,
      [[1, 'blocks.open-bracket']],
    ],
    ['text in a list', JSON.stringify([quintic, [['a', 0, 0, 0]]], null, 1), [[35, 'blocks.not-integers']]],
    ['a ragged list', JSON.stringify([[...quintic, [1, 2]]]), [[1, 'blocks.ragged']]],
    ['text among rows on a line', 'a: [1,0,0,0],[0,1,0,0] and so on', [[1, 'blocks.not-integers']]],
  ] as const)('reports %s and where', (_, text, expected) => {
    expect(problemsOf(text)).toEqual(expected)
  })

  it('keeps the blocks around a bad one', () => {
    const text = [asRows, '', asRows.replace('0 1 0 0', '0 1 zero 0'), '', asRows].join('\n')
    const { polytopes, problems } = parsePointBlocks(text)
    expect(polytopes.map(({ line }) => line)).toEqual([1, 13])
    expect(problems.map(({ line }) => line)).toEqual([8])
    expect(problems[0].message).toContain('"zero" is no integer')
  })

  it('reads 500 good and 3 bad blocks as 500 polytopes and 3 problems', () => {
    const blocks = bundled('small')
      .slice(0, 503)
      .map(({ id, vertices }, i) =>
        i % 3 === 0
          ? `${id}\n${vertices.map((row) => row.join(' ')).join('\n')}`
          : i % 3 === 1
            ? `4 ${vertices.length}\n${[0, 1, 2, 3].map((axis) => vertices.map((v) => v[axis]).join(' ')).join('\n')}`
            : JSON.stringify(vertices),
      )
    blocks[7] = '1 0 0 0\n0 1 0 0\n0 0 one 0'
    blocks[200] = '1 0 0 0\n0 1 0 0\n0 0 1'
    blocks[400] = '1 2 3\n4 5 6'
    const { polytopes, problems } = parsePointBlocks(blocks.join('\n\n'))
    expect(polytopes.length).toBe(500)
    for (const { rows } of polytopes) expect(polytopeFromPoints(rows).vertexCount).toBe(rows.length)
    const lines = blocks.join('\n\n').split('\n')
    expect(problems.map(({ line }) => lines[line - 1])).toEqual(['0 0 one 0', '0 0 1', '1 2 3'])
  })

  it('is not slowed down by deep brackets and large texts', () => {
    const text = `${'('.repeat(50_000)}\n${`${asRows}\n\n`.repeat(20_000)}`
    const { polytopes, problems } = parsePointBlocks(text)
    // The brackets take the first block with them.
    expect(polytopes.length).toBe(19_999)
    expect(problems.map(({ code }) => code)).toEqual(['blocks.open-bracket'])
  })
})
