import { starterTargets, type StarterTarget } from '../../../shared/starterTargets.ts'
import { describeScope } from '../../components/scope/scopeAddress.ts'

/** Rules to begin from, each with what it is for. */
export function StarterChoice({
  chosen,
  onChoose,
}: {
  chosen: StarterTarget | null
  onChoose: (starter: StarterTarget) => void
}) {
  return (
    <section aria-label="Starters" className="border-t py-3">
      <h2 className="mb-1 text-sm">Begin from a usual hunt</h2>
      <ul className="grid grid-cols-1 gap-x-6 sm:grid-cols-2 lg:grid-cols-3">
        {starterTargets.map((starter) => (
          <li key={starter.id}>
            <button
              type="button"
              aria-pressed={starter.id === chosen?.id}
              onClick={() => onChoose(starter)}
              className="w-full rounded px-2 py-1.5 text-left hover:bg-action-wash aria-pressed:bg-action-wash"
            >
              <span className="block font-medium text-action">{starter.name}</span>
              <span className="block text-xs text-soft">
                {starter.purpose} For {describeScope(starter.scope)}.
              </span>
            </button>
          </li>
        ))}
      </ul>
    </section>
  )
}
