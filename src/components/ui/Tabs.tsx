import { type ReactNode } from 'react'
import { Tabs as Primitive } from 'radix-ui'

export interface TabItem {
  value: string
  label: ReactNode
  content: ReactNode
}

export function Tabs({
  items,
  value,
  onChange,
  label,
}: {
  items: readonly TabItem[]
  value: string
  onChange: (value: string) => void
  label: string
}) {
  return (
    <Primitive.Root value={value} onValueChange={onChange}>
      <Primitive.List aria-label={label} className="flex gap-4 overflow-x-auto border-b">
        {items.map((item) => (
          <Primitive.Trigger
            key={item.value}
            value={item.value}
            className="-mb-px min-h-8 border-b-2 border-transparent whitespace-nowrap text-soft focus-visible:-outline-offset-2 hover:text-ink data-[state=active]:border-action data-[state=active]:font-medium data-[state=active]:text-ink"
          >
            {item.label}
          </Primitive.Trigger>
        ))}
      </Primitive.List>
      {items.map((item) => (
        <Primitive.Content key={item.value} value={item.value} className="pt-3">
          {item.content}
        </Primitive.Content>
      ))}
    </Primitive.Root>
  )
}
