import { useEffect, useRef } from 'react'
import { renderFormula } from './renderFormula.ts'

/** A typeset formula; copying it gives the TeX. */
export function Formula({ tex, className = '' }: { tex: string; className?: string }) {
  const element = useRef<HTMLSpanElement>(null)
  useEffect(() => {
    if (element.current) renderFormula(tex, element.current)
  }, [tex])
  return <span ref={element} className={className} />
}
