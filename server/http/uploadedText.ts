import type { Request } from 'express'
import { Refusal, unprocessable } from '../problems.ts'

/** The uploaded file of a request as text, with its name. */
export function uploadedText({ file }: Request): { readonly text: string; readonly name: string } {
  if (!file) throw unprocessable('no-file', 'Send the file in the field "file".', { path: 'file' })
  try {
    const text = new TextDecoder('utf-8', { fatal: true }).decode(file.buffer)
    // Names come as the bytes of their header.
    const name = Buffer.from(file.originalname, 'latin1').toString('utf8')
    return { text, name: name.slice(0, 120) || 'a file' }
  } catch {
    throw new Refusal(422, 'not-text', 'The file is not a text file in UTF-8.', { path: 'file' })
  }
}
