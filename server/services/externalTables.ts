import { randomUUID } from 'node:crypto'
import type { EntityManager } from 'typeorm'
import {
  uploadExternalSchema,
  type ExternalColumn,
  type ExternalTable as ExternalTableView,
  type ExternalValue,
  type UploadExternal,
} from '../../shared/externalTables.ts'
import type { ServerContext } from '../context.ts'
import { ExternalRow } from '../entities/externalRow.ts'
import { ExternalTable } from '../entities/externalTable.ts'
import { Shortlist } from '../entities/shortlist.ts'
import { notFound, Refusal, unprocessable } from '../problems.ts'
import { readExternalText } from './externalTableText.ts'

/** Rows per statement: SQLite takes a limited number of values in one. */
const rowsPerInsert = 2_000

/** Tables of a campaign, or those of them that one list shows; oldest first, the order of their columns. */
async function tablesOf(
  manager: EntityManager,
  campaignId: string,
  shortlistId?: string,
): Promise<ExternalTable[]> {
  const tables = await manager.find(ExternalTable, {
    where: { campaignId },
    relations: { author: true },
    order: { createdAt: 'ASC', id: 'ASC' },
  })
  return shortlistId === undefined
    ? tables
    : tables.filter((table) => table.shortlistId === null || table.shortlistId === shortlistId)
}

export async function listExternalTables(
  manager: EntityManager,
  campaignId: string,
  shortlistId?: string,
): Promise<ExternalTableView[]> {
  return (await tablesOf(manager, campaignId, shortlistId)).map(presentTable)
}

/** @param table with its author loaded */
function presentTable(table: ExternalTable): ExternalTableView {
  const { id, name, shortlistId, columns, rowCount, author, createdAt } = table
  return { id, name, shortlistId, columns, rows: rowCount, author: author?.name ?? '', createdAt }
}

/** The external columns of a list, and their values per candidate in the same order. */
export interface ExternalContents {
  readonly columns: readonly ExternalColumn[]
  readonly valuesOf: (candidateKey: string) => (ExternalValue | null)[]
}

export async function externalOf(
  manager: EntityManager,
  campaignId: string,
  shortlistId: string,
  candidateKeys: readonly string[],
): Promise<ExternalContents> {
  const tables = await tablesOf(manager, campaignId, shortlistId)
  const keys = JSON.stringify(candidateKeys)
  const columns: ExternalColumn[] = []
  const perTable: { readonly width: number; readonly rows: Map<string, string> }[] = []
  for (const table of tables) {
    const { id, name, author, createdAt } = table
    const rows = await manager.query<{ candidateKey: string; text: string }[]>(
      `SELECT candidateKey, "values" AS text FROM external_row
       WHERE tableId = ? AND candidateKey IN (SELECT value FROM json_each(?))`,
      [id, keys],
    )
    perTable.push({
      width: table.columns.length,
      rows: new Map(rows.map(({ candidateKey, text }) => [candidateKey, text])),
    })
    for (const column of table.columns) {
      columns.push({ ...column, tableId: id, tableName: name, author: author?.name ?? '', createdAt })
    }
  }
  return {
    columns,
    valuesOf: (key) =>
      perTable.flatMap(({ width, rows }) => {
        const text = rows.get(key)
        return text === undefined
          ? Array<null>(width).fill(null)
          : (JSON.parse(text) as (ExternalValue | null)[])
      }),
  }
}

/**
 * Stores a table, whole or not at all, in place of another where one is named. Names of columns are unique among
 * those that some list would show together.
 */
export async function uploadExternal(
  { source, writes, streams }: ServerContext,
  campaignId: string,
  authorId: string,
  upload: UploadExternal,
): Promise<ExternalTableView> {
  const { name, shortlistId, replaces, asText, text } = uploadExternalSchema.parse(upload)
  if (text.includes('\uFFFD') || text.includes('\0')) {
    throw unprocessable('not-text', 'The file is not a text file in UTF-8.', { path: 'text' })
  }
  const reading = readExternalText(text, asText)
  if (!reading.ok) {
    const [{ line, column, message }] = reading.problems
    throw unprocessable('table-invalid', `Line ${line}, cell ${column}: ${message}`, {
      path: 'text',
      places: reading.problems,
    })
  }
  const { columns, rows } = reading
  const id = replaces ?? randomUUID()
  await writes.transaction(async (manager) => {
    if (shortlistId !== undefined && !(await manager.existsBy(Shortlist, { campaignId, id: shortlistId }))) {
      throw notFound('shortlist')
    }
    const others = await tablesOf(manager, campaignId)
    if (replaces !== undefined && others.every((table) => table.id !== replaces)) {
      throw notFound('table of external columns')
    }
    const together = others.filter(
      (table) =>
        table.id !== replaces &&
        (shortlistId === undefined || table.shortlistId === null || table.shortlistId === shortlistId),
    )
    requireNewNames(columns, together)
    const stored = {
      campaignId,
      shortlistId: shortlistId ?? null,
      name,
      columns,
      rowCount: rows.size,
      authorId,
      createdAt: new Date().toISOString(),
    }
    if (replaces === undefined) await manager.insert(ExternalTable, { id, ...stored })
    else {
      await manager.delete(ExternalRow, { tableId: id })
      await manager.update(ExternalTable, { id }, stored)
    }
    const list = [...rows].map(([candidateKey, values]) => ({
      tableId: id,
      candidateKey,
      values: [...values],
    }))
    for (let from = 0; from < list.length; from += rowsPerInsert) {
      await manager.insert(ExternalRow, list.slice(from, from + rowsPerInsert))
    }
  })
  streams.toCampaign(campaignId, { kind: 'changed', what: 'external-tables' })
  const table = await source.manager.findOneOrFail(ExternalTable, {
    where: { id },
    relations: { author: true },
  })
  return presentTable(table)
}

function requireNewNames(columns: ExternalTableView['columns'], others: readonly ExternalTable[]): void {
  for (const { name } of columns) {
    const owner = others.find((table) =>
      table.columns.some((column) => column.name.toLowerCase() === name.toLowerCase()),
    )
    if (!owner) continue
    throw new Refusal(
      409,
      'column-exists',
      `The table “${owner.name}” has a column “${name}” already. Replace that table, or give the column another name.`,
      { path: 'text', found: name },
    )
  }
}

export async function removeExternal(
  { writes, streams }: ServerContext,
  campaignId: string,
  tableId: string,
): Promise<void> {
  await writes.transaction(async (manager) => {
    const { affected } = await manager.delete(ExternalTable, { campaignId, id: tableId })
    if (affected === 0) throw notFound('table of external columns')
  })
  streams.toCampaign(campaignId, { kind: 'changed', what: 'external-tables' })
}
