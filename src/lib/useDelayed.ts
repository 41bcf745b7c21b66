import { useEffect, useState } from 'react'

/** The value as it was when it last stood still for `delay` milliseconds. */
export function useDelayed<Value>(value: Value, delay: number): Value {
  const [settled, setSettled] = useState(value)
  useEffect(() => {
    const timer = setTimeout(() => setSettled(value), delay)
    return () => clearTimeout(timer)
  }, [value, delay])
  return settled
}
