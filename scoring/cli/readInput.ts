import { readFileSync } from 'node:fs'
import { InputError } from '../errors.ts'

/**
 * The JSON of a file, or of standard input for `-`.
 * @throws InputError input.unreadable, input.not-json
 */
export function readInput(file: string): unknown {
  let text: string
  try {
    text = readFileSync(file === '-' ? 0 : file, 'utf8')
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error)
    throw new InputError('input.unreadable', `${file} cannot be read: ${reason}`)
  }
  try {
    return JSON.parse(text.replace(/^\uFEFF/, '')) as unknown
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error)
    throw new InputError('input.not-json', `${file === '-' ? 'Standard input' : file} is no JSON: ${reason}`)
  }
}
