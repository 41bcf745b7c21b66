import { type ReactNode } from 'react'
import { Dialog as Primitive } from 'radix-ui'
import { X } from 'lucide-react'
import { IconButton } from './Button.tsx'

export interface DialogProps {
  open: boolean
  onOpenChange: (open: boolean) => void
  title: string
  description?: ReactNode
  wide?: boolean
  /** Where the focus goes when it closes, if not to what opened it. */
  onCloseFocus?: () => void
  children: ReactNode
}

/** What a dialog is made of; pages use `Dialog`, which fetches it when it is first opened. */
export function DialogFrame({
  open,
  onOpenChange,
  title,
  description,
  wide,
  onCloseFocus,
  children,
}: DialogProps) {
  return (
    <Primitive.Root open={open} onOpenChange={onOpenChange}>
      <Primitive.Portal>
        <Primitive.Overlay className="fixed inset-0 z-40 bg-veil" />
        <Primitive.Content
          onCloseAutoFocus={
            onCloseFocus &&
            ((event) => {
              event.preventDefault()
              onCloseFocus()
            })
          }
          className={`fixed inset-x-2 top-4 z-50 mx-auto flex max-h-[calc(100dvh-2rem)] flex-col rounded border border-edge bg-sheet shadow-lifted sm:top-[8vh] sm:max-h-[84vh] ${wide ? 'max-w-[760px]' : 'max-w-[520px]'}`}
          {...(description === undefined ? { 'aria-describedby': undefined } : {})}
        >
          <header className="flex items-start gap-2 border-b px-4 py-3">
            <div className="min-w-0 flex-1">
              <Primitive.Title className="text-lg">{title}</Primitive.Title>
              {description !== undefined && (
                <Primitive.Description className="prose-line text-soft">{description}</Primitive.Description>
              )}
            </div>
            <Primitive.Close asChild>
              <IconButton label="Close">
                <X size={16} aria-hidden />
              </IconButton>
            </Primitive.Close>
          </header>
          <div className="overflow-y-auto px-4 py-4">{children}</div>
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  )
}
