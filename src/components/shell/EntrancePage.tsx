import { type ReactNode } from 'react'
import { Mark } from './Mark.tsx'
import { ThemeButton } from './ThemeButton.tsx'

/** Frame of the pages before sign-in. */
export function EntrancePage({ title, children }: { title: string; children: ReactNode }) {
  return (
    <div className="min-h-dvh">
      <div className="mx-auto flex max-w-[880px] items-center gap-2 px-4 py-2">
        <Mark />
        <span className="flex-1 font-serif text-base font-semibold">Tessellary</span>
        <ThemeButton />
      </div>
      <div className="graduated" aria-hidden />
      <main className="mx-auto max-w-[880px] px-4 pt-[10vh] pb-16">
        <div className="max-w-[360px]">
          <h1 className="mb-4 text-xl">{title}</h1>
          {children}
        </div>
      </main>
    </div>
  )
}
