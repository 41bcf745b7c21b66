import { lazy, Suspense, useState } from 'react'
import { type DialogProps } from './DialogFrame.tsx'

/** Fetches what dialogs are made of; the frame of the pages calls it when a page has come to rest. */
export const prepareDialogs = () => import('./DialogFrame.tsx')

const Frame = lazy(async () => ({ default: (await prepareDialogs()).DialogFrame }))

export function Dialog(props: DialogProps) {
  const [used, setUsed] = useState(props.open)
  if (props.open && !used) setUsed(true)
  if (!used) return null
  return (
    <Suspense fallback={null}>
      <Frame {...props} />
    </Suspense>
  )
}
