import { searchMethods } from '../../../../shared/searches.ts'
import { Select, TextField } from '../../../components/ui/Field.tsx'
import { surrogateByDefault, type Draft } from './searchPreset.ts'
import { SurrogateBox } from './SurrogateBox.tsx'

const methods = Object.entries(searchMethods)

/** Methods that end by themselves when nothing new turns up; the others have nothing to be patient about. */
const patient: readonly Draft['method'][] = ['auto', 'annealing', 'tempering', 'genetic', 'uniform', 'random']

interface NumberSetting {
  readonly field: 'budget' | 'seed' | 'islands' | 'keep' | 'descents' | 'patience'
  readonly label: string
  readonly limits: string
  readonly hint?: string
  /** What an empty field stands for. */
  readonly usual?: string
  /** All methods have it unless some are named. */
  readonly methods?: readonly Draft['method'][]
}

const numbers: readonly NumberSetting[] = [
  {
    field: 'budget',
    label: 'Budget, evaluations',
    limits: '10 to 1 000 000',
    hint: 'Distinct classes, over all islands.',
  },
  { field: 'seed', label: 'Seed', limits: '0 to 2^31' },
  {
    field: 'islands',
    label: 'Islands',
    limits: '1 to 16',
    hint: 'Independent chains. Five or more give the hit rate an interval; fewer go further in short runs.',
  },
  { field: 'keep', label: 'Keep the best', limits: '1 to 500', hint: 'Distinct candidates.' },
  {
    field: 'descents',
    label: 'Descents',
    limits: '1 to 1000',
    hint: 'Fresh starts that share an island’s budget.',
    usual: '1',
    methods: ['annealing'],
  },
  {
    field: 'patience',
    label: 'Patience',
    limits: '10 to 1 000 000',
    hint: 'Proposals without a new class before a polytope is given up.',
    usual: '2000',
    methods: patient,
  },
]

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
        onChange={(event) => {
          const chosen = event.target.value as Draft['method']
          onChange({ method: chosen, surrogate: surrogateByDefault(chosen) })
        }}
        options={methods}
      />
      {numbers
        .filter(({ methods: only }) => only === undefined || only.includes(method))
        .map(({ field, label, limits, hint, usual }) => (
          <TextField
            key={field}
            label={label}
            inputMode="numeric"
            placeholder={usual}
            value={draft[field]}
            hint={hint}
            error={fault(field, `A whole number from ${limits}.`)}
            onChange={(event) => onChange({ [field]: event.target.value })}
          />
        ))}
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
