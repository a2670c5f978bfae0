import Papa from 'papaparse'
import type { ErrorLine } from '@/lib/core/errors'
import { decodeText } from './decode-text'

export type RosterLine = Readonly<{ line: number; candidateNumber: string; givenName: string; familyName: string; email: string | null }>
/** `hasEmails` false: the file has no such column, so it says nothing about addresses. */
export type Roster = Readonly<{ lines: readonly RosterLine[]; faults: readonly ErrorLine[]; hasEmails: boolean }>

const wanted = ['candidate_number', 'given_name', 'family_name'] as const
type Column = (typeof wanted)[number] | 'email'
type Record = Readonly<{ line: number; fields: readonly string[]; open: boolean }>

/**
 * Reads a class list from a CSV file as schools write them: UTF-8 or Windows-1252, with or without a byte order mark,
 * separated by commas, semicolons or tabs, columns in any order. Never throws: each fault names its line, counted from 1.
 */
export function readRoster(bytes: Uint8Array): Roster {
  const text = decodeText(bytes)
  if (text === null) return faulty('the file', 'is not a text file. In the spreadsheet choose “Save as” and CSV.')
  const [header, ...records] = recordsOf(text)
  if (!header) return faulty('line 1', 'is missing: the file is empty.')
  const names = header.fields.map((name) => name.trim().toLowerCase().replace(/[\s-]+/g, '_'))
  const missing = wanted.filter((name) => !names.includes(name))
  if (missing.length > 0) return faulty(`line ${header.line}`, `should name the columns; ${missing.join(', ')} ${missing.length > 1 ? 'are' : 'is'} not there.`)
  const twice = [...wanted, 'email'].find((name) => names.indexOf(name) !== names.lastIndexOf(name))
  if (twice) return faulty(`line ${header.line}`, `names the column ${twice} twice.`)
  return { ...readLines(records, names), hasEmails: names.includes('email') }
}

function faulty(path: string, says: string): Roster {
  return { lines: [], faults: [{ path, says }], hasEmails: false }
}

/** The lines that are not blank, with the line each begins on: a quoted field may run over a line end. */
function recordsOf(text: string): Record[] {
  const records: Record[] = []
  let from = 0
  let line = 1
  Papa.parse<string[]>(text, {
    delimiter: separatorOf(text),
    newline: '\n',
    step: ({ data, errors, meta }) => {
      if (data.some((field) => field.trim() !== '')) records.push({ line, fields: data, open: errors.some((error) => error.type === 'Quotes') })
      line += text.slice(from, meta.cursor).split('\n').length - 1
      from = meta.cursor
    },
  })
  return records
}

/** The separator that the header is written with. */
function separatorOf(text: string): string {
  const header = text.split('\n').find((line) => line.trim() !== '') ?? ''
  const counted = [',', ';', '\t'].map((sign) => [sign, header.split(sign).length] as const)
  return counted.reduce((best, next) => (next[1] > best[1] ? next : best))[0]
}

function readLines(records: readonly Record[], names: readonly string[]): Omit<Roster, 'hasEmails'> {
  const lines: RosterLine[] = []
  const faults: ErrorLine[] = []
  const seen = new Map<string, number>()
  for (const record of records) {
    const get = (column: Column) => clean(record.fields[names.indexOf(column)] ?? '')
    const read = { line: record.line, candidateNumber: get('candidate_number'), givenName: get('given_name'), familyName: get('family_name'), email: get('email').toLowerCase() || null }
    const says = faultsOf(record, read, names.length, seen.get(read.candidateNumber))
    faults.push(...says.map((fault) => ({ path: `line ${record.line}`, says: fault })))
    seen.set(read.candidateNumber, seen.get(read.candidateNumber) ?? record.line)
    if (says.length === 0) lines.push(read)
  }
  if (records.length === 0) faults.push({ path: 'the file', says: 'names its columns but holds no student.' })
  return { lines, faults }
}

function clean(field: string): string {
  return field.normalize('NFC').replace(/\s+/gu, ' ').trim()
}

function faultsOf(record: Record, read: RosterLine, columns: number, before: number | undefined): string[] {
  if (record.open) return ['has a quotation mark that is not closed, or stands in the middle of a field.']
  if (record.fields.slice(columns).some((field) => field.trim() !== '')) return ['has more fields than the first line has columns. Is a separator inside a name?']
  const number = read.candidateNumber
  return [
    number === '' && 'has no candidate number.',
    number !== '' && !/^[\p{L}\p{N}](?:[\p{L}\p{N}/-]{0,18}[\p{L}\p{N}])?$/u.test(number) && `has the candidate number “${number.slice(0, 30)}”: letters and figures only, up to 20.`,
    number !== '' && before !== undefined && `has the candidate number ${number}, as line ${before} has.`,
    read.givenName === '' && 'has no given name.',
    read.familyName === '' && 'has no family name.',
    (read.givenName.length > 80 || read.familyName.length > 80) && 'has a name of more than 80 letters.',
    read.email !== null && !/^[^\s@<>",;]+@[^\s@<>",;]+\.[^\s@<>",;.]+$/.test(read.email) && `has “${read.email.slice(0, 60)}” for an e-mail address.`,
  ].filter((fault) => fault !== false)
}
