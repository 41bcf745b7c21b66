import { Link, useParams, useSearchParams } from 'react-router-dom'
import { type SearchSummary } from '../../../../shared/searches.ts'
import { useSearches } from '../../../api/searches.ts'
import { ButtonLink } from '../../../components/ui/Button.tsx'
import { Caution } from '../../../components/ui/Caution.tsx'
import { PageHead, Section } from '../../../components/ui/Layout.tsx'
import { Empty, QueryView } from '../../../components/ui/States.tsx'
import { VersionSelect } from '../../../components/target/VersionSelect.tsx'
import { AssemblyFields } from './AssemblyFields.tsx'
import { assemblyAddress, readAssembly, type AssemblyAddress } from './assemblyAddress.ts'
import { DraftView } from './DraftView.tsx'
import { SourceList } from './SourceList.tsx'
import { useDraft } from './useDraft.ts'

export function NewShortlistPage() {
  const { campaignId = '' } = useParams()
  const searches = useSearches(campaignId)
  return (
    <>
      <PageHead
        title="New shortlist"
        above={
          <Link to={`/campaigns/${campaignId}/shortlists`} className="hover:underline">
            Shortlists
          </Link>
        }
      >
        Drawn from what searches have found so far, and frozen with all it was made from. What each choice
        leaves is shown as you choose.
      </PageHead>
      <QueryView query={searches} what="the searches">
        {(list) => {
          const found = list.filter(({ evaluations }) => evaluations > 0)
          return found.length === 0 ? (
            <Empty title="No search has found a candidate yet.">
              <ButtonLink to={`/campaigns/${campaignId}/searches/new`}>Start a search</ButtonLink>
            </Empty>
          ) : (
            <Assembly campaign={campaignId} searches={found} />
          )
        }}
      </QueryView>
    </>
  )
}

function Assembly({ campaign, searches }: { campaign: string; searches: SearchSummary[] }) {
  const [address, setAddress] = useSearchParams()
  const read = readAssembly(address)
  const chosen = searches.filter(({ id }) => read.searchIds.includes(id))
  const assembly = { ...read, searchIds: chosen.map(({ id }) => id) }
  const change = (changes: Partial<AssemblyAddress>) =>
    setAddress(assemblyAddress({ ...assembly, ...changes }), { replace: true })
  const [first] = chosen
  const alike = chosen.every(
    ({ targetId, targetVersion }) => targetId === first?.targetId && targetVersion === first.targetVersion,
  )
  const asTheyRan = first && alike ? `as they ran: ${first.targetName}, version ${first.targetVersion}` : null
  const ready = chosen.length > 0 && (assembly.versionId !== '' || alike)
  const draft = useDraft(campaign, assembly, ready)
  return (
    <>
      <Section title="Searches" margin note="The finds of all that are ticked, each candidate once.">
        <SourceList
          searches={searches}
          chosen={assembly.searchIds}
          onChange={(searchIds) => change({ searchIds })}
        />
      </Section>
      <Section
        title="Ranked by"
        margin
        note="Another version than the searches': its scores are computed first."
      >
        <div className="max-w-[480px]">
          <VersionSelect
            campaign={campaign}
            targetId={first?.targetId ?? ''}
            label="Target version"
            value={assembly.versionId}
            first={asTheyRan ?? 'choose…'}
            hint={
              chosen.length > 0 && !alike && assembly.versionId === ''
                ? 'These searches ran with different rules: choose the one by which their finds are ranked.'
                : undefined
            }
            onChange={(versionId) => change({ versionId })}
          />
        </div>
      </Section>
      <Section
        title="Choice"
        margin
        note="Along the ranking a candidate is taken unless a limit stands against it."
      >
        <AssemblyFields
          settings={assembly.settings}
          columns={draft.data?.columns ?? []}
          onChange={(settings) => change({ settings: { ...assembly.settings, ...settings } })}
        />
      </Section>
      <Section title="What it leaves" margin>
        {ready ? (
          <DraftView campaign={campaign} assembly={assembly} searches={chosen} draft={draft} />
        ) : (
          <p className="text-soft">
            {chosen.length === 0 ? 'Tick one or more searches.' : 'Choose the version to rank by.'}
          </p>
        )}
      </Section>
      <Caution className="mt-2" />
    </>
  )
}
