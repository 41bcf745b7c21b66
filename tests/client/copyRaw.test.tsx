// @vitest-environment happy-dom
import { describe, expect, it } from 'vitest'
import { render } from '@testing-library/react'
import { Num } from '../../src/components/ui/Num.tsx'
import { rawText } from '../../src/lib/copyRaw.ts'

describe('copying', () => {
  it('gives the raw value of a typeset number', () => {
    const { container } = render(<Num value={1.23456789e-6} />)
    expect(container.textContent).toContain('1.235')
    expect(rawText(container).trim()).toBe('0.00000123456789')
  })

  it('parts cells by tabs and rows by line ends', () => {
    const { container } = render(
      <table>
        <tbody>
          <tr>
            <td>D3</td>
            <td>
              <Num value={-16} />
            </td>
          </tr>
          <tr>
            <td>D4</td>
            <td>
              <Num value={12345.5} />
            </td>
          </tr>
        </tbody>
      </table>,
    )
    expect(rawText(container).trim()).toBe('D3\t-16\nD4\t12345.5')
  })
})
