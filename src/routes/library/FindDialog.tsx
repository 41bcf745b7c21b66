import { useState, type FormEvent } from 'react'
import { Link } from 'react-router-dom'
import { type FoundPolytopes } from '../../../shared/polytopeStructure.ts'
import { useFindPolytopes } from '../../api/polytopes.ts'
import { Button } from '../../components/ui/Button.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { TextArea } from '../../components/ui/Field.tsx'
import { Failure } from '../../components/ui/States.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'

interface FindDialogProps {
  campaign?: string
  open: boolean
  onOpenChange: (open: boolean) => void
  /** What was pasted into the search field. */
  pasted: string
}

/** Asks whether the library holds a polytope, whatever the coordinates it is given in. */
export function FindDialog({ campaign, open, onOpenChange, pasted }: FindDialogProps) {
  return (
    <Dialog
      wide
      open={open}
      onOpenChange={onOpenChange}
      title="Find by points or weights"
      description="Polytopes are compared by their normal form under GL(4,Z): coordinates and order of the points do not matter. Nothing is stored."
    >
      <FindForm campaign={campaign} pasted={pasted} onLeave={() => onOpenChange(false)} />
    </Dialog>
  )
}

function FindForm({ campaign, pasted, onLeave }: { campaign?: string; pasted: string; onLeave: () => void }) {
  const find = useFindPolytopes(campaign)
  const [text, setText] = useState(pasted)
  const submit = (event: FormEvent) => {
    event.preventDefault()
    if (text.trim() !== '') find.mutate(text)
  }
  return (
    <form onSubmit={submit} className="flex flex-col gap-4">
      <TextArea
        label="Points, or five weights"
        mono
        rows={8}
        spellCheck={false}
        autoFocus
        value={text}
        placeholder={' 1  0  0  0\n 0  1  0  0\n 0  0  1  0\n 0  0  0  1\n-1 -1 -6 -9'}
        hint="One polytope per block, up to 20, a line per point or per coordinate; or a weight system on one line."
        onChange={(event) => setText(event.target.value)}
      />
      <Button
        type="submit"
        kind="primary"
        className="self-start"
        busy={find.isPending}
        unavailable={text.trim() === '' && 'Give points or weights first.'}
      >
        {find.isPending ? 'Looking…' : 'Look it up'}
      </Button>
      {find.isError && <Failure title="Nothing was looked up." error={find.error} />}
      {find.data && <Findings findings={find.data} campaign={campaign} onLeave={onLeave} />}
    </form>
  )
}

function Findings({
  findings: { found, problems },
  campaign,
  onLeave,
}: {
  findings: FoundPolytopes
  campaign?: string
  onLeave: () => void
}) {
  const missing = found.filter(({ name }) => name === null).length
  return (
    <div role="status" className="flex flex-col gap-3">
      {found.length > 0 && (
        <Table label="Polytopes looked up">
          <thead>
            <tr>
              <Th>Given</Th>
              <Th numeric>h11</Th>
              <Th numeric>h21</Th>
              <Th>In the library</Th>
            </tr>
          </thead>
          <tbody>
            {found.map((one, at) => (
              <tr key={at}>
                <Td>{one.side ?? `line ${one.line}`}</Td>
                <Td numeric>{one.h11}</Td>
                <Td numeric>{one.h21}</Td>
                <Td>
                  {one.name === null ? (
                    <span className="text-soft">no</span>
                  ) : (
                    <Link
                      className="text-action hover:underline"
                      to={`/library/${one.key}${campaign ? `?campaign=${campaign}` : ''}`}
                      onClick={onLeave}
                    >
                      {one.name}
                    </Link>
                  )}
                </Td>
              </tr>
            ))}
          </tbody>
        </Table>
      )}
      {missing > 0 && (
        <p className="text-soft">What is not in the library can be brought in with “Import polytopes”.</p>
      )}
      {problems.length > 0 && (
        <ul>
          {problems.map((problem, at) => (
            <li key={at} className="border-b py-1.5">
              {problem.line !== null && <span className="mr-2 font-mono text-xs">line {problem.line}</span>}
              {problem.message} <span className="font-mono text-xs text-soft">{problem.code}</span>
            </li>
          ))}
        </ul>
      )}
    </div>
  )
}
