/** A thin bar for work that has a known end. */
export function Progress({ value, most, label }: { value: number; most: number; label: string }) {
  const percent = most > 0 ? Math.min(100, (100 * value) / most) : 0
  return (
    <div
      role="progressbar"
      aria-label={label}
      aria-valuemin={0}
      aria-valuemax={most}
      aria-valuenow={value}
      className="h-1.5 w-full min-w-24 overflow-hidden rounded-full bg-null-wash"
    >
      <div className="h-full bg-action transition-[width]" style={{ width: `${percent}%` }} />
    </div>
  )
}
