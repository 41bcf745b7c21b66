import { useState, type FormEvent } from 'react'
import { Link, useNavigate, useParams, useSearchParams } from 'react-router-dom'
import { createSearchSchema, searchMethods, type CreateSearch } from '../../../../shared/searches.ts'
import { type Scope } from '../../../../shared/polytopes.ts'
import { type TargetSummary } from '../../../../shared/targets.ts'
import { ApiError } from '../../../api/request.ts'
import { useCreateSearch } from '../../../api/searches.ts'
import { useTargets } from '../../../api/targets.ts'
import { isEmptyScope, ScopeFields } from '../../../components/scope/ScopeFields.tsx'
import { scopeFromAddress } from '../../../components/scope/scopeAddress.ts'
import { useBarred } from '../../../components/shell/currentCampaign.tsx'
import { Button, ButtonLink } from '../../../components/ui/Button.tsx'
import { Caution } from '../../../components/ui/Caution.tsx'
import { Select, TextField } from '../../../components/ui/Field.tsx'
import { PageHead, Section } from '../../../components/ui/Layout.tsx'
import { Empty, Failure, QueryView } from '../../../components/ui/States.tsx'
import { formatNumber } from '../../../lib/numbers.ts'
import { SurrogateBox } from './SurrogateBox.tsx'

export function NewSearchPage() {
  const { campaignId = '' } = useParams()
  const targets = useTargets(campaignId)
  return (
    <>
      <PageHead
        title="New search"
        above={
          <Link to={`/campaigns/${campaignId}/searches`} className="hover:underline">
            Searches
          </Link>
        }
      />
      <QueryView query={targets} what="the targets">
        {(list) =>
          list.length === 0 ? (
            <Empty title="A search needs a target, and none has been written.">
              <ButtonLink to={`/campaigns/${campaignId}/targets/new`}>Write a target</ButtonLink>
            </Empty>
          ) : (
            <Composer campaign={campaignId} targets={list} />
          )
        }
      </QueryView>
    </>
  )
}

const methods = Object.entries(searchMethods)

const wholeNumber = (text: string) => (/^\d+$/.test(text.trim()) ? Number(text) : Number.NaN)

/** A seed to start from; a person may put any other. */
const drawSeed = () => String(Math.floor(Math.random() * 1e6))

function Composer({ campaign, targets }: { campaign: string; targets: TargetSummary[] }) {
  const [address] = useSearchParams()
  const navigate = useNavigate()
  const create = useCreateSearch(campaign)
  const barred = useBarred('searches.run')
  const named = targets.find(({ id }) => id === address.get('target'))
  const [chosen, setChosen] = useState<string | null>(null)
  const targetId = chosen ?? named?.id ?? targets[0]?.id ?? ''
  const [scope, setScope] = useState<Scope>(
    () => scopeFromAddress(address) ?? { kind: 'polytopes', keys: [] },
  )
  const [method, setMethod] = useState<CreateSearch['method']>('annealing')
  const [budget, setBudget] = useState('2000')
  const [seed, setSeed] = useState(drawSeed)
  const [islands, setIslands] = useState('2')
  const [keep, setKeep] = useState('100')
  const [surrogate, setSurrogate] = useState(true)
  const [name, setName] = useState('')
  const [tried, setTried] = useState(false)

  const target = targets.find(({ id }) => id === targetId)
  const olderVersion = address.get('version')
  const versionId = targetId === named?.id && olderVersion ? olderVersion : target?.latest.id
  const older = versionId !== target?.latest.id
  const parsed = createSearchSchema.safeParse({
    name: name.trim() || undefined,
    targetVersionId: versionId ?? '',
    scope,
    method,
    budget: wholeNumber(budget),
    seed: wholeNumber(seed),
    islands: wholeNumber(islands),
    keep: wholeNumber(keep),
    surrogate,
  })
  const fault = (field: string, says: string) =>
    tried && !parsed.success && parsed.error.issues.some((issue) => issue.path[0] === field) ? says : null

  const submit = (event: FormEvent) => {
    event.preventDefault()
    setTried(true)
    if (!parsed.success || barred) return
    create.mutate(parsed.data, {
      onSuccess: (search) => void navigate(`/campaigns/${campaign}/searches/${search.id}`),
    })
  }

  return (
    <form onSubmit={submit} noValidate>
      <Section title="Target" margin note="What a good candidate is.">
        <div className="max-w-[640px]">
          <Select
            label="Target"
            value={targetId}
            onChange={(event) => setChosen(event.target.value)}
            options={targets.map(({ id, name: label, latest }) => [id, `${label}, version ${latest.number}`])}
            hint={older ? 'The version opened before, not the latest, is used.' : undefined}
          />
          {target && !older && (
            <pre
              tabIndex={0}
              aria-label="The rule of this target"
              className="mt-2 max-h-56 overflow-auto border-l-2 border-line pl-3 font-mono text-xs leading-5"
            >
              {target.latest.text}
            </pre>
          )}
        </div>
      </Section>
      <Section title="Scope" margin note="The polytopes whose triangulations are searched.">
        <div className="max-w-[760px]">
          <ScopeFields campaign={campaign} scope={scope} onScope={setScope} />
          {fault('scope', 'Choose between 1 and 500 polytopes, or a filter.') && isEmptyScope(scope) && (
            <p role="alert" className="mt-1 text-xs text-rejected">
              Choose between 1 and 500 polytopes, or a filter.
            </p>
          )}
        </div>
      </Section>
      <Section title="Method" margin note="The same settings and seed give the same result, to the bit.">
        <div className="grid max-w-[760px] grid-cols-2 gap-3 sm:grid-cols-4">
          <Select
            label="Method"
            className="col-span-2 sm:col-span-4"
            value={method}
            onChange={(event) => setMethod(event.target.value as CreateSearch['method'])}
            options={methods}
          />
          <TextField
            label="Budget, evaluations"
            inputMode="numeric"
            value={budget}
            hint="Distinct classes, over all islands."
            error={fault('budget', 'A whole number from 10 to 1 000 000.')}
            onChange={(event) => setBudget(event.target.value)}
          />
          <TextField
            label="Seed"
            inputMode="numeric"
            value={seed}
            error={fault('seed', 'A whole number from 0 to 2^31.')}
            onChange={(event) => setSeed(event.target.value)}
          />
          <TextField
            label="Islands"
            inputMode="numeric"
            value={islands}
            hint="Independent chains. Five or more give the hit rate an interval; fewer go further in short runs."
            error={fault('islands', 'A whole number from 1 to 16.')}
            onChange={(event) => setIslands(event.target.value)}
          />
          <TextField
            label="Keep the best"
            inputMode="numeric"
            value={keep}
            hint="Distinct candidates."
            error={fault('keep', 'A whole number from 1 to 500.')}
            onChange={(event) => setKeep(event.target.value)}
          />
          <SurrogateBox
            className="col-span-2 sm:col-span-4"
            method={method}
            on={surrogate}
            onChange={setSurrogate}
          />
          <TextField
            label="Name (optional)"
            className="col-span-2"
            maxLength={80}
            value={name}
            onChange={(event) => setName(event.target.value)}
          />
        </div>
      </Section>
      <div className="border-t py-4">
        {create.isError && (
          <div className="mb-4">
            <Failure title="The search was not started." error={create.error} />
            {create.error instanceof ApiError && create.error.problem.issues && (
              <ul className="mt-2 font-mono text-xs">
                {create.error.problem.issues.map((issue, index) => (
                  <li key={index}>
                    line {issue.line}, column {issue.column}: {issue.message}
                  </li>
                ))}
              </ul>
            )}
          </div>
        )}
        <Button kind="primary" type="submit" busy={create.isPending} unavailable={barred}>
          {create.isPending
            ? 'Starting…'
            : `Start the search${parsed.success ? ` of ${formatNumber(parsed.data.budget)} evaluations` : ''}`}
        </Button>
        <Caution className="mt-4" />
      </div>
    </form>
  )
}
