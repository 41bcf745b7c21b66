/** Our mark: a lattice polygon cut into unit triangles, one of them filled. */
export function Mark({ size = 24 }: { size?: number }) {
  return (
    <svg width={size} height={size} viewBox="0 0 32 32" fill="none" aria-hidden className="shrink-0">
      <g stroke="var(--action)" strokeWidth="1.6" strokeLinejoin="round">
        <path d="M4 16 16 4 28 4 28 16 16 28 4 28Z" />
        <path d="M4 28 16 16 28 4M4 16H28M16 4V28" />
        <path d="M16 16H28L16 28Z" fill="var(--found-fill)" />
      </g>
    </svg>
  )
}
