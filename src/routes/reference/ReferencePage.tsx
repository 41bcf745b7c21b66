import { PageHead } from '../../components/ui/Layout.tsx'
import { ReferenceList } from '../../components/editor/ReferenceList.tsx'

/** Everything a scoring rule can say, with formulas, units and sources. */
export function ReferencePage() {
  return (
    <>
      <PageHead title="Observables and language">
        Everything a scoring rule can say. A rule sees nothing but the observables of one candidate, and none
        of them depends on how points are numbered.
      </PageHead>
      <div className="max-w-[860px] border-t pt-4">
        <ReferenceList open />
      </div>
    </>
  )
}
