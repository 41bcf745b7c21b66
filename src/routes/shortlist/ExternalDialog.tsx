import { useState, type FormEvent } from 'react'
import { useQuery } from '@tanstack/react-query'
import { toast } from 'sonner'
import { externalLimits, type ExternalTable } from '../../../shared/externalTables.ts'
import { externalTablesQuery, useRemoveExternal, useUploadExternal } from '../../api/externalTables.ts'
import { ApiError, explain } from '../../api/request.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { Select, TextArea, TextField } from '../../components/ui/Field.tsx'
import { Failure, QueryView } from '../../components/ui/States.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { counted, formatBytes, formatTime } from '../../lib/numbers.ts'

interface ExternalProps {
  campaign: string
  shortlist: string
  open: boolean
  onOpenChange: (open: boolean) => void
}

/** Columns that people bring along: the tables a list shows, and the form that adds or replaces one. */
export function ExternalDialog({ campaign, shortlist, open, onOpenChange }: ExternalProps) {
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title="External columns"
      wide
      description="Numbers and words that were found out elsewhere, keyed by candidate. Lists show them, sort and filter by them and export them; no rule and no search can read them."
    >
      <ExternalTables campaign={campaign} shortlist={shortlist} />
    </Dialog>
  )
}

function ExternalTables({ campaign, shortlist }: Pick<ExternalProps, 'campaign' | 'shortlist'>) {
  const tables = useQuery(externalTablesQuery(campaign, shortlist))
  return (
    <QueryView query={tables} what="the external columns">
      {(list) => (
        <>
          {list.length > 0 && <TableList campaign={campaign} list={list} />}
          <UploadForm campaign={campaign} shortlist={shortlist} tables={list} />
        </>
      )}
    </QueryView>
  )
}

function TableList({ campaign, list }: { campaign: string; list: readonly ExternalTable[] }) {
  const barred = useBarred('external.edit')
  const remove = useRemoveExternal(campaign)
  return (
    <div className="mb-5">
      <Table label="Tables of external columns">
        <thead>
          <tr>
            <Th>Table</Th>
            <Th>Columns</Th>
            <Th numeric>Candidates</Th>
            <Th>Shown in</Th>
            <Th>By</Th>
            <Th>
              <span className="sr-only">Actions</span>
            </Th>
          </tr>
        </thead>
        <tbody>
          {list.map(({ id, name, columns, rows, shortlistId, author, createdAt }) => (
            <tr key={id}>
              <Td>{name}</Td>
              <Td className="max-w-56 truncate">
                <span title={columns.map((column) => `${column.name} (${column.type})`).join(', ')}>
                  {columns.map((column) => column.name).join(', ')}
                </span>
              </Td>
              <Td numeric>{rows}</Td>
              <Td>{shortlistId === null ? 'every list' : 'this list'}</Td>
              <Td>
                <span title={formatTime(createdAt)}>{author}</span>
              </Td>
              <Td>
                <Button
                  kind="quiet"
                  unavailable={barred}
                  busy={remove.isPending && remove.variables === id}
                  aria-label={`Remove ${name}`}
                  onClick={() =>
                    remove.mutate(id, {
                      onSuccess: () => void toast(`“${name}” was removed.`),
                      onError: (error) => void toast.error(explain(error)),
                    })
                  }
                >
                  Remove
                </Button>
              </Td>
            </tr>
          ))}
        </tbody>
      </Table>
    </div>
  )
}

const placeholder = `candidate,mass,note
0123456789abcdef0123456789abcdef,1.5,from our own code`

function UploadForm({
  campaign,
  shortlist,
  tables,
}: {
  campaign: string
  shortlist: string
  tables: readonly ExternalTable[]
}) {
  const barred = useBarred('external.edit')
  const upload = useUploadExternal(campaign)
  const [text, setText] = useState('')
  const [name, setName] = useState('')
  const [reach, setReach] = useState('list')
  const [replaces, setReplaces] = useState('')
  const [asText, setAsText] = useState('')
  const [fault, setFault] = useState<string | null>(null)
  const take = async (file: File | undefined) => {
    if (!file) return
    if (file.size > externalLimits.bytes) {
      setFault(
        `${file.name} has ${formatBytes(file.size)}; the limit is ${formatBytes(externalLimits.bytes)}.`,
      )
      return
    }
    setFault(null)
    setText(await file.text())
    setName(file.name.slice(0, 120))
  }
  const submit = (event: FormEvent) => {
    event.preventDefault()
    if (barred) return
    if (text.trim() === '') {
      setFault('Choose a file, or paste a table.')
      return
    }
    setFault(null)
    upload.mutate(
      {
        name: name.trim() || 'pasted table',
        text,
        ...(reach === 'list' && { shortlistId: shortlist }),
        ...(replaces !== '' && { replaces }),
        asText: asText
          .split(',')
          .map((column) => column.trim())
          .filter((column) => column !== ''),
      },
      {
        onSuccess: (table) => {
          toast(
            `“${table.name}” brings ${counted(table.columns.length, 'column')} for ${counted(table.rows, 'candidate')}.`,
          )
          setText('')
          setName('')
          setReplaces('')
          setAsText('')
        },
      },
    )
  }
  const places = upload.error instanceof ApiError ? (upload.error.problem.places ?? []) : []
  return (
    <form onSubmit={submit} noValidate className="flex flex-col gap-3">
      <TextField
        label="A file of comma-separated values"
        type="file"
        accept=".csv,.tsv,.txt,text/csv,text/plain"
        className="[&_input]:py-1"
        onChange={(event) => void take(event.target.files?.[0])}
      />
      <TextArea
        label="Or the table itself"
        mono
        rows={5}
        spellCheck={false}
        placeholder={placeholder}
        value={text}
        hint="The first line names the columns, one of them candidate. A column whose cells are all numbers is one of numbers."
        error={fault}
        onChange={(event) => setText(event.target.value)}
      />
      <div className="grid gap-3 sm:grid-cols-2">
        <TextField
          label="Name of the table"
          value={name}
          maxLength={120}
          placeholder="pasted table"
          onChange={(event) => setName(event.target.value)}
        />
        <Select
          label="Shown in"
          value={reach}
          onChange={(event) => setReach(event.target.value)}
          options={[
            ['list', 'this list only'],
            ['campaign', 'every list of the campaign'],
          ]}
        />
        {tables.length > 0 && (
          <Select
            label="In place of"
            value={replaces}
            onChange={(event) => setReplaces(event.target.value)}
            options={[['', 'no other table'], ...tables.map((table) => [table.id, table.name] as const)]}
          />
        )}
        <TextField
          label="Columns to be kept as text (optional)"
          value={asText}
          placeholder="run, batch"
          onChange={(event) => setAsText(event.target.value)}
        />
      </div>
      {upload.isError &&
        (places.length === 0 ? (
          <Failure title="The table was not taken." error={upload.error} />
        ) : (
          <div role="alert" className="border-l-2 border-rejected py-1 pl-3">
            <p className="font-medium">The table was not taken.</p>
            <ul className="mt-1 max-h-40 overflow-y-auto text-xs">
              {places.map(({ line, column, code, message }, at) => (
                <li key={at}>
                  line {line}, cell {column}: {message} <span className="font-mono text-soft">{code}</span>
                </li>
              ))}
            </ul>
          </div>
        ))}
      <Button
        kind="primary"
        type="submit"
        busy={upload.isPending}
        unavailable={barred}
        className="self-start"
      >
        {replaces === '' ? 'Add the columns' : 'Replace the table'}
      </Button>
    </form>
  )
}
