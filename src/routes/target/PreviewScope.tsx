import { memo } from 'react'
import { describeScope } from '../../components/scope/scopeAddress.ts'
import { ScopeFields } from '../../components/scope/ScopeFields.tsx'
import { ScopeFold } from '../../components/scope/ScopeFold.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { Select } from '../../components/ui/Field.tsx'
import { type WorkScope } from './useWorkScope.ts'

const sizes = [100, 200, 500, 1000, 2000].map((size) => [String(size), String(size)] as const)

/** What the preview's null sample is drawn from, and why from there. */
export const PreviewScope = memo(function PreviewScope({
  campaign,
  work: { scope, origin, choose, release },
  size,
  onSize,
}: {
  campaign: string
  work: WorkScope
  size: number
  onSize: (size: number) => void
}) {
  return (
    <ScopeFold
      className="mb-3 border-b pb-2"
      scope={scope}
      summary={
        <>
          Null sample of {size} from <span className="text-ink">{describeScope(scope)}</span> · {origin}
        </>
      }
    >
      <div className="mt-3 flex flex-col gap-3 pb-1">
        {release && (
          <Button className="self-start" onClick={release.run}>
            {release.label}
          </Button>
        )}
        <ScopeFields campaign={campaign} scope={scope} onScope={choose} />
        <Select
          label="Candidates in the sample"
          className="max-w-48"
          value={size}
          onChange={(event) => onSize(Number(event.target.value))}
          options={sizes}
        />
      </div>
    </ScopeFold>
  )
})
