import {
  useId,
  type InputHTMLAttributes,
  type ReactNode,
  type SelectHTMLAttributes,
  type TextareaHTMLAttributes,
} from 'react'

const box =
  'w-full min-h-8 rounded border border-edge bg-sheet px-2 text-ink placeholder:text-soft aria-invalid:border-rejected disabled:opacity-60'

interface FieldProps {
  label: string
  hint?: ReactNode
  error?: string | null
  className?: string
}

function FieldFrame({
  id,
  label,
  hint,
  error,
  className = '',
  children,
}: FieldProps & { id: string; children: ReactNode }) {
  return (
    <div className={className}>
      <label htmlFor={id} className="mb-1 block text-xs font-medium text-soft">
        {label}
      </label>
      {children}
      {hint !== undefined && (
        <p id={`${id}-hint`} className="mt-1 text-xs text-soft">
          {hint}
        </p>
      )}
      {error && (
        <p id={`${id}-error`} role="alert" className="mt-1 text-xs text-rejected">
          {error}
        </p>
      )}
    </div>
  )
}

const described = (id: string, { hint, error }: FieldProps) =>
  [hint !== undefined && `${id}-hint`, error && `${id}-error`].filter(Boolean).join(' ') || undefined

/** Any control in the frame of a field; it takes what it is given. */
export function Field({
  children,
  ...frame
}: FieldProps & {
  children: (field: { id: string; className: string; 'aria-describedby'?: string }) => ReactNode
}) {
  const id = useId()
  return (
    <FieldFrame id={id} {...frame}>
      {children({ id, className: box, 'aria-describedby': described(id, frame) })}
    </FieldFrame>
  )
}

export function TextField({
  label,
  hint,
  error,
  className,
  mono,
  ...rest
}: FieldProps & { mono?: boolean } & InputHTMLAttributes<HTMLInputElement>) {
  const id = useId()
  const frame = { label, hint, error, className }
  return (
    <FieldFrame id={id} {...frame}>
      <input
        {...rest}
        id={id}
        aria-invalid={error ? true : undefined}
        aria-describedby={described(id, frame)}
        className={`${box} ${mono ? 'font-mono' : ''}`}
      />
    </FieldFrame>
  )
}

export function TextArea({
  label,
  hint,
  error,
  className,
  mono,
  ...rest
}: FieldProps & { mono?: boolean } & TextareaHTMLAttributes<HTMLTextAreaElement>) {
  const id = useId()
  const frame = { label, hint, error, className }
  return (
    <FieldFrame id={id} {...frame}>
      <textarea
        {...rest}
        id={id}
        aria-invalid={error ? true : undefined}
        aria-describedby={described(id, frame)}
        className={`${box} py-1.5 ${mono ? 'font-mono text-xs leading-5' : ''}`}
      />
    </FieldFrame>
  )
}

export function Select({
  label,
  hint,
  error,
  className,
  options,
  ...rest
}: FieldProps & {
  options: readonly (readonly [value: string, label: string])[]
} & SelectHTMLAttributes<HTMLSelectElement>) {
  const id = useId()
  const frame = { label, hint, error, className }
  return (
    <FieldFrame id={id} {...frame}>
      <select
        {...rest}
        id={id}
        aria-invalid={error ? true : undefined}
        aria-describedby={described(id, frame)}
        className={box}
      >
        {options.map(([value, text]) => (
          <option key={value} value={value}>
            {text}
          </option>
        ))}
      </select>
    </FieldFrame>
  )
}
