import { searchMethods } from '../../../../shared/searches.ts'
import { Select, TextField } from '../../../components/ui/Field.tsx'
import { type Draft } from './searchPreset.ts'
import { SurrogateBox } from './SurrogateBox.tsx'

const methods = Object.entries(searchMethods)

/** Methods that end by themselves when nothing new turns up; the others have nothing to be patient about. */
const patient: readonly Draft['method'][] = ['auto', 'annealing', 'tempering', 'genetic', 'uniform', 'random']

/** The method and its few settings. */
export function MethodFields({
  draft,
  onChange,
  name,
  onName,
  fault,
}: {
  draft: Draft
  onChange: (changes: Partial<Draft>) => void
  name: string
  onName: (name: string) => void
  fault: (field: string, says: string) => string | null
}) {
  const { method } = draft
  return (
    <div className="grid max-w-[760px] grid-cols-2 gap-3 sm:grid-cols-4">
      <Select
        label="Method"
        className="col-span-2 sm:col-span-4"
        value={method}
        onChange={(event) => onChange({ method: event.target.value as Draft['method'] })}
        options={methods}
      />
      <TextField
        label="Budget, evaluations"
        inputMode="numeric"
        value={draft.budget}
        hint="Distinct classes, over all islands."
        error={fault('budget', 'A whole number from 10 to 1 000 000.')}
        onChange={(event) => onChange({ budget: event.target.value })}
      />
      <TextField
        label="Seed"
        inputMode="numeric"
        value={draft.seed}
        error={fault('seed', 'A whole number from 0 to 2^31.')}
        onChange={(event) => onChange({ seed: event.target.value })}
      />
      <TextField
        label="Islands"
        inputMode="numeric"
        value={draft.islands}
        hint="Independent chains. Five or more give the hit rate an interval; fewer go further in short runs."
        error={fault('islands', 'A whole number from 1 to 16.')}
        onChange={(event) => onChange({ islands: event.target.value })}
      />
      <TextField
        label="Keep the best"
        inputMode="numeric"
        value={draft.keep}
        hint="Distinct candidates."
        error={fault('keep', 'A whole number from 1 to 500.')}
        onChange={(event) => onChange({ keep: event.target.value })}
      />
      {method === 'annealing' && (
        <TextField
          label="Descents"
          inputMode="numeric"
          placeholder="1"
          value={draft.descents}
          hint="Fresh starts that share an island’s budget."
          error={fault('descents', 'A whole number from 1 to 1000.')}
          onChange={(event) => onChange({ descents: event.target.value })}
        />
      )}
      {patient.includes(method) && (
        <TextField
          label="Patience"
          inputMode="numeric"
          placeholder="2000"
          value={draft.patience}
          hint="Proposals without a new class before a polytope is given up."
          error={fault('patience', 'A whole number from 10 to 1 000 000.')}
          onChange={(event) => onChange({ patience: event.target.value })}
        />
      )}
      <SurrogateBox
        className="col-span-2 sm:col-span-4"
        method={method}
        on={draft.surrogate}
        onChange={(surrogate) => onChange({ surrogate })}
      />
      <TextField
        label="Name (optional)"
        className="col-span-2"
        maxLength={80}
        value={name}
        onChange={(event) => onName(event.target.value)}
      />
    </div>
  )
}
