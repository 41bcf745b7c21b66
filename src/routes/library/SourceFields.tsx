import { type ReactNode } from 'react'
import { X } from 'lucide-react'
import { pastedLimitBytes, uploadLimitBytes } from '../../../shared/polytopes.ts'
import { Button } from '../../components/ui/Button.tsx'
import { TextArea, TextField } from '../../components/ui/Field.tsx'
import { formatBytes } from '../../lib/numbers.ts'

/** What is imported: a pasted text, or a file instead. */
export interface Source {
  readonly text: string
  readonly file: File | null
}

export const noSource: Source = { text: '', file: null }

/** Why a source cannot be sent, or null. */
export function sourceFault({ text, file }: Source, fileLimit = uploadLimitBytes): string | null {
  if (file) {
    return file.size > fileLimit
      ? `${file.name} has ${formatBytes(file.size)}; the limit is ${formatBytes(fileLimit)}. Split it and import the parts.`
      : null
  }
  const bytes = byteLength(text)
  return bytes > pastedLimitBytes
    ? `${formatBytes(bytes)} were pasted; the limit is ${formatBytes(pastedLimitBytes)}. Choose a file for more.`
    : null
}

export const isEmptySource = ({ text, file }: Source): boolean => file === null && text.trim() === ''

const byteLength = (text: string): number => new TextEncoder().encode(text).length

/** Two ways to give a text: typed or pasted, or a file. */
export function SourceFields({
  label,
  source,
  onChange,
  placeholder,
  hint,
  accept,
  fileLimit = uploadLimitBytes,
  below,
}: {
  label: string
  source: Source
  onChange: (source: Source) => void
  placeholder: string
  hint: ReactNode
  accept: string
  fileLimit?: number
  /** What there is to say of the pasted text. */
  below?: ReactNode
}) {
  const { text, file } = source
  const fault = sourceFault(source, fileLimit)
  if (file) {
    return (
      <div>
        <p className="mb-1 text-xs font-medium text-soft">{label}</p>
        <p className="flex items-center gap-2 border-y py-1">
          <span className="min-w-0 flex-1 truncate">
            {file.name} <span className="text-soft">{formatBytes(file.size)}</span>
          </span>
          <Button kind="quiet" onClick={() => onChange({ text, file: null })}>
            <X size={14} aria-hidden />
            Take another
          </Button>
        </p>
        {fault && (
          <p role="alert" className="mt-1 text-xs text-rejected">
            {fault}
          </p>
        )}
      </div>
    )
  }
  return (
    <div className="flex flex-col gap-3">
      <TextArea
        label={label}
        mono
        rows={8}
        spellCheck={false}
        value={text}
        placeholder={placeholder}
        hint={hint}
        error={fault}
        onChange={(event) => onChange({ text: event.target.value, file: null })}
      />
      {below}
      <TextField
        label="Or a file"
        type="file"
        accept={accept}
        className="[&_input]:py-1"
        hint={`Text of up to ${formatBytes(fileLimit)}; pasted text up to ${formatBytes(pastedLimitBytes)}.`}
        onChange={(event) => onChange({ text, file: event.target.files?.[0] ?? null })}
      />
    </div>
  )
}
