/** The formats that are read, for those who want to write them. */
export function CandidateFormats() {
  return (
    <details className="text-sm">
      <summary className="cursor-pointer text-action">Formats</summary>
      <div className="prose-line mt-2 flex flex-col gap-2 text-soft">
        <p>
          <strong className="font-medium text-ink">Text in sections.</strong> A word on a line opens a
          section: <Code>vertices</Code>, <Code>weights 1 1 1 6 9 fan</Code> or <Code>polytope</Code> with the
          key of a polytope of the library; then <Code>heights</Code>, <Code>lifted points</Code> (coordinates
          and height in a row), <Code>simplices</Code> or <Code>triangles</Code>. Heights and indices refer to{' '}
          <Code>points</Code>, or else to the vertices as listed; indices count from 0, or say{' '}
          <Code>indices from 1</Code>. <Code>candidate NAME</Code> begins another. Blocks without a heading
          are taken by their shape. <Code>#</Code> begins a comment; other lines are skipped and listed.
        </p>
        <p>
          <strong className="font-medium text-ink">A table (CSV)</strong> with a candidate a row, columns{' '}
          <Code>name</Code>, <Code>vertices</Code> (or <Code>polytope</Code>, or <Code>weights</Code> and{' '}
          <Code>side</Code>), <Code>points</Code>, and <Code>heights</Code>, <Code>simplices</Code> or{' '}
          <Code>triangles</Code>, rows inside a cell parted by semicolons; or with a point a row, columns{' '}
          <Code>x1, x2, x3, x4, height</Code>.
        </p>
        <p>
          <strong className="font-medium text-ink">JSON:</strong> objects with fields of these names, alone,
          in a list, or one a line; input and output of the headless evaluation, the lines of a headless
          search, exported shortlists, and certificates. In simplices and triangles a corner may be an index
          or a point.
        </p>
        <p>
          A simplex has four corners, or five with the origin. Lattice points inside facets do not count and
          may be listed or left out.
        </p>
      </div>
    </details>
  )
}

function Code({ children }: { children: string }) {
  return <code className="font-mono text-xs whitespace-nowrap text-ink">{children}</code>
}
