import { describe, expect, it } from 'vitest'
import { readExternalText } from '../../../server/services/externalTableText.ts'
import { externalLimits } from '../../../shared/externalTables.ts'

const key = (n: number) => String(n).padStart(32, '0')

function problemsOf(text: string, asText: string[] = []): [number, number, string][] {
  const reading = readExternalText(text, asText)
  if (reading.ok) throw new Error('the text was read')
  return reading.problems.map(({ line, column, code }) => [line, column, code])
}
function tableOf(text: string, asText: string[] = []) {
  const reading = readExternalText(text, asText)
  if (!reading.ok) throw new Error(JSON.stringify(reading.problems))
  return { columns: reading.columns, rows: [...reading.rows] }
}

describe('a table of external columns', () => {
  it('has typed columns, empty cells, quotes, remarks and any of three separators', () => {
    const expected = {
      columns: [
        { name: 'mass', type: 'number' },
        { name: 'note', type: 'text' },
      ],
      rows: [
        [key(1), [1.5, 'a, "b"\nc']],
        [key(2), [-2e-3, null]],
        [key(3), [null, '7 of 9']],
      ],
    }
    const text = (separator: string, end: string) =>
      [
        '\uFEFF# made elsewhere, with "quotes',
        ['candidate', 'mass', 'note'].join(separator),
        '',
        [key(1), '1.5', `"a, ""b""${end}c"`].join(separator),
        [key(2), ' -2e-3', ''].join(separator),
        [key(3), '', '7 of 9'].join(separator),
      ].join(end)
    for (const separator of [',', ';', '\t']) {
      for (const end of ['\n', '\r\n']) expect(tableOf(text(separator, end))).toEqual(expected)
    }
  })

  it('takes the key from wherever it stands, and keeps as text what is to be text or would lose digits', () => {
    const text = `n,Candidate,big,hex\n1,${key(1)},9007199254740993,0x1\n2,${key(2)},3,7\n`
    expect(tableOf(text, ['n'])).toEqual({
      columns: [
        { name: 'n', type: 'text' },
        { name: 'big', type: 'text' },
        { name: 'hex', type: 'text' },
      ],
      rows: [
        [key(1), ['1', '9007199254740993', '0x1']],
        [key(2), ['2', '3', '7']],
      ],
    })
    // No cell at all: nothing says that it is a number.
    expect(tableOf(`candidate,a\n${key(1)},\n`).columns).toEqual([{ name: 'a', type: 'text' }])
    expect(tableOf('candidate,a\n')).toEqual({ columns: [{ name: 'a', type: 'text' }], rows: [] })
  })

  it('is refused with the place of each mistake', () => {
    expect(problemsOf('')).toEqual([[1, 1, 'table-empty']])
    expect(problemsOf('# only a remark\n')).toEqual([[1, 1, 'table-empty']])
    expect(problemsOf('\nkey,a\n')).toEqual([[2, 1, 'no-candidate-column']])
    expect(problemsOf('candidate\n')).toEqual([[1, 2, 'no-columns']])
    expect(problemsOf('candidate,a,,A\n')).toEqual([
      [1, 3, 'column-unnamed'],
      [1, 4, 'column-twice'],
    ])
    expect(problemsOf(`candidate,${'x'.repeat(61)}\n`)).toEqual([[1, 2, 'column-name-too-long']])
    expect(problemsOf('candidate,a\n', ['b'])).toEqual([[1, 1, 'no-such-column']])
    const wide = Array.from({ length: 41 }, (_, n) => `c${n}`).join()
    expect(problemsOf(`candidate,${wide}\n`)).toEqual([[1, 42, 'too-many-columns']])
    const body = `a,candidate\n"two\nlines",${key(1)}\n# remark\n1,XYZ\n2\n3,${key(1)},4\n5,${key(1)}\n`
    expect(problemsOf(body)).toEqual([
      [5, 2, 'candidate-malformed'],
      [6, 2, 'row-ragged'],
      [7, 3, 'row-ragged'],
      [8, 2, 'candidate-twice'],
    ])
    expect(problemsOf(`candidate,a\n${key(1)},${'x'.repeat(501)}\n`)).toEqual([[2, 2, 'text-too-long']])
    expect(problemsOf(`candidate,a\n${key(1)},"open\n`)).toEqual([[2, 2, 'quote-open']])
    expect(problemsOf(`candidate,a\n${key(1)},o"pen"\n`)).toEqual([[2, 2, 'quote-misplaced']])
    expect(problemsOf(`candidate,a\n${key(1)},"o"pen\n`)).toEqual([[2, 2, 'quote-misplaced']])
  })

  it('has a limit of rows, and lists no more than fifty mistakes', () => {
    const rows = Array.from({ length: externalLimits.rows + 1 }, (_, n) => `${key(n)},${n}`)
    expect(problemsOf(`candidate,a\n${rows.join('\n')}\n`)).toEqual([
      [externalLimits.rows + 2, 1, 'too-many-rows'],
    ])
    expect(problemsOf(`candidate,a\n${'x,1\n'.repeat(60)}`)).toHaveLength(50)
  })
})
