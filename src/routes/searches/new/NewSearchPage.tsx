import { useState, type FormEvent } from 'react'
import { Link, useNavigate, useParams, useSearchParams } from 'react-router-dom'
import { useQuery } from '@tanstack/react-query'
import { createSearchSchema, startless } from '../../../../shared/searches.ts'
import { type TargetSummary } from '../../../../shared/targets.ts'
import { useActions } from '../../../actions/useActions.ts'
import { ApiError } from '../../../api/request.ts'
import { searchQuery, useCreateSearch } from '../../../api/searches.ts'
import { useTargets } from '../../../api/targets.ts'
import { isEmptyScope, ScopeFields } from '../../../components/scope/ScopeFields.tsx'
import { useBarred } from '../../../components/shell/currentCampaign.tsx'
import { Button, ButtonLink } from '../../../components/ui/Button.tsx'
import { Caution } from '../../../components/ui/Caution.tsx'
import { Select } from '../../../components/ui/Field.tsx'
import { PageHead, Section } from '../../../components/ui/Layout.tsx'
import { Empty, Failure, QueryView } from '../../../components/ui/States.tsx'
import { formatNumber } from '../../../lib/numbers.ts'
import { recall } from '../../../lib/remembered.ts'
import { readScope } from '../../target/useWorkScope.ts'
import { CostLine } from './CostLine.tsx'
import { MethodFields } from './MethodFields.tsx'
import { draftOfSearch, type Draft } from './searchPreset.ts'
import { StartFields } from './StartFields.tsx'
import { useDraft } from './useDraft.ts'

export function NewSearchPage() {
  const { campaignId = '' } = useParams()
  const [address] = useSearchParams()
  const targets = useTargets(campaignId)
  const [clone] = useState(() => address.get('clone'))
  const cloned = useQuery({ ...searchQuery(campaignId, clone ?? ''), enabled: clone !== null })
  return (
    <>
      <PageHead
        title="New search"
        above={
          <Link to={`/campaigns/${campaignId}/searches`} className="hover:underline">
            Searches
          </Link>
        }
      >
        The address holds these settings: pass it on, and others find the composer filled in like this.
      </PageHead>
      <QueryView query={targets} what="the targets">
        {(list) =>
          list.length === 0 ? (
            <Empty title="A search needs a target, and none has been written.">
              <ButtonLink to={`/campaigns/${campaignId}/targets/new`}>Write a target</ButtonLink>
            </Empty>
          ) : clone === null ? (
            <Composer
              campaign={campaignId}
              targets={list}
              base={previewedOn(address.get('target') ?? list[0]?.id)}
            />
          ) : (
            <QueryView query={cloned} what="the search whose settings these are">
              {(search) => <Composer campaign={campaignId} targets={list} base={draftOfSearch(search)} />}
            </QueryView>
          )
        }
      </QueryView>
    </>
  )
}

/** A target is usually searched where it was previewed; an address that names a scope goes before that. */
function previewedOn(target: string | undefined): Partial<Draft> {
  const scope = target === undefined ? null : readScope(recall(`scope.${target}`))
  return scope ? { scope } : {}
}

const wholeNumber = (text: string) => (/^\d+$/.test(text.trim()) ? Number(text) : Number.NaN)

/** Undefined where the field is left to the engine. */
const chosenNumber = (text: string) => (text.trim() === '' ? undefined : wholeNumber(text))

interface ComposerProps {
  campaign: string
  targets: TargetSummary[]
  base: Partial<Draft>
}

function Composer({ campaign, targets, base }: ComposerProps) {
  const navigate = useNavigate()
  const create = useCreateSearch(campaign)
  const barred = useBarred('searches.run')
  const [draft, change] = useDraft(base)
  const [name, setName] = useState('')
  const [tried, setTried] = useState(false)
  const { scope, method, starts } = draft

  const target = targets.find(({ id }) => id === draft.target) ?? targets[0]
  const isNamed = target?.id === draft.target
  const versionId = isNamed && draft.version !== '' ? draft.version : target?.latest.id
  const older = versionId !== target?.latest.id
  const parsed = createSearchSchema.safeParse({
    name: name.trim() || undefined,
    targetVersionId: versionId ?? '',
    scope,
    method,
    budget: wholeNumber(draft.budget),
    seed: wholeNumber(draft.seed),
    islands: wholeNumber(draft.islands),
    keep: wholeNumber(draft.keep),
    surrogate: draft.surrogate,
    settings: {
      ...(method === 'annealing' && { descents: chosenNumber(draft.descents) }),
      patience: chosenNumber(draft.patience),
    },
    ...(starts && { starts }),
  })
  const fault = (field: string, says: string) =>
    tried && !parsed.success && parsed.error.issues.some(({ path }) => path[path.length - 1] === field)
      ? says
      : null

  const start = () => {
    setTried(true)
    if (!parsed.success || barred) return
    create.mutate(parsed.data, {
      onSuccess: (search) => void navigate(`/campaigns/${campaign}/searches/${search.id}`),
    })
  }
  const submit = (event: FormEvent) => {
    event.preventDefault()
    start()
  }
  useActions([
    {
      ...{ id: 'search.start', label: 'Start the search', section: 'New search' },
      ...{ shortcut: 'Mod+Enter', unavailable: barred, run: start },
    },
  ])

  return (
    <form onSubmit={submit} noValidate>
      <Section title="Target" margin note="What a good candidate is.">
        <div className="max-w-[640px]">
          <Select
            label="Target"
            value={target?.id ?? ''}
            onChange={(event) => change({ target: event.target.value, version: '' })}
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
          <ScopeFields campaign={campaign} scope={scope} onScope={(next) => change({ scope: next })} />
          {tried && isEmptyScope(scope) && (
            <p role="alert" className="mt-1 text-xs text-rejected">
              Choose between 1 and 500 polytopes, or a filter.
            </p>
          )}
        </div>
      </Section>
      <Section title="Start" margin note="Where the search begins.">
        <StartFields
          campaign={campaign}
          starts={starts}
          onStarts={(next) => change({ starts: next })}
          scope={scope}
          onScope={(next) => change({ scope: next })}
          ignored={startless.includes(method)}
        />
      </Section>
      <Section title="Method" margin note="The same settings and seed give the same result, to the bit.">
        <MethodFields draft={draft} onChange={change} name={name} onName={setName} fault={fault} />
      </Section>
      <Section title="Cost" margin note="Before anything is started.">
        <CostLine
          campaign={campaign}
          asked={
            isEmptyScope(scope) || versionId === undefined || barred
              ? null
              : { targetVersionId: versionId, scope, method }
          }
          budget={wholeNumber(draft.budget)}
          islands={wholeNumber(draft.islands)}
        />
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
