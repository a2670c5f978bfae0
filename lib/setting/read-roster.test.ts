import { readFileSync } from 'node:fs'
import fc from 'fast-check'
import Papa from 'papaparse'
import { describe, expect, it } from 'vitest'
import { planRoster, type KnownStudent } from './plan-roster'
import { readRoster } from './read-roster'

const utf8 = (text: string) => new TextEncoder().encode(text)
const head = 'candidate_number,given_name,family_name,email\n'
const zoe = { line: 2, candidateNumber: '0073', givenName: 'Zoë', familyName: 'Brontë-Hale', email: 'zoe@example.org' }

describe('reading a class list', () => {
  it.each(['bitonal', 'booklet', 'everyday', 'one-page'])('reads every line of the %s list', (name) => {
    const bytes = readFileSync(`seeds/class-sets/${name}/roster.csv`)
    const { lines, faults } = readRoster(bytes)
    expect(faults).toEqual([])
    expect(lines).toHaveLength(bytes.toString('utf8').trim().split('\n').length - 1)
  })

  it('keeps leading noughts: a candidate number is text', () => {
    expect(readRoster(utf8(`${head}0073,Zoë,Brontë-Hale,zoe@example.org\n`)).lines).toEqual([zoe])
  })

  const written = `${head}0073,Zoë,Brontë-Hale,zoe@example.org\r\n`
  it.each([
    ['a byte order mark', utf8(`\ufeff${written}`)],
    ['semicolons', utf8(written.replaceAll(',', ';'))],
    ['tabs', utf8(written.replaceAll(',', '\t'))],
    ['Windows-1252', Uint8Array.from([...written].map((sign) => sign.charCodeAt(0)))],
    ['UTF-16 and tabs, as “Unicode text”', new Uint8Array(Buffer.from(`\ufeff${written.replaceAll(',', '\t')}`, 'utf16le'))],
    ['old line ends', utf8(written.replaceAll('\r\n', '\n').replaceAll('\n', '\r'))],
    ['another order and case, and a column of its own', utf8('House;E-Mail;Family Name;EMAIL;Candidate-Number;GIVEN_NAME\nNorth;;Brontë-Hale;ZOE@example.org;0073;Zoë\n')],
    ['quotes', utf8(`${head}"0073"," Zoë ","Brontë-Hale","zoe@example.org"`)],
  ])('reads a list with %s', (_, bytes) => {
    const { lines, faults } = readRoster(bytes)
    expect(faults).toEqual([])
    expect(lines).toEqual([zoe])
  })

  it('takes blank and shared e-mail addresses, a list without that column, and two students of one name', () => {
    const { lines, faults } = readRoster(utf8(`${head}1,Ana,Lund,home@example.org\n2,Per,Lund,home@example.org\n3,Per,Lund,\n`))
    expect(faults).toEqual([])
    expect(lines.map((line) => line.email)).toEqual(['home@example.org', 'home@example.org', null])
    expect(readRoster(utf8('candidate_number,given_name,family_name\n1,Ana,Lund')).hasEmails).toBe(false)
  })

  it('names each faulty line by the line of the file, also after blank lines and a field over two lines', () => {
    const { faults, lines } = readRoster(utf8(`${head}\n1,"Ana\nMaria",Lund,\n,,,\n,Per,Lund,\n1,Ida,Berg,ida@\n8.1E+03,Ole,,\n`))
    expect(faults).toEqual([
      { path: 'line 6', says: 'has no candidate number.' },
      { path: 'line 7', says: 'has the candidate number 1, as line 3 has.' },
      { path: 'line 7', says: 'has “ida@” for an e-mail address.' },
      { path: 'line 8', says: 'has the candidate number “8.1E+03”: letters and figures only, up to 20.' },
      { path: 'line 8', says: 'has no family name.' },
    ])
    expect(lines).toEqual([{ line: 3, candidateNumber: '1', givenName: 'Ana Maria', familyName: 'Lund', email: null }])
  })

  it('says what is wrong with a whole file', () => {
    expect(readRoster(utf8('')).faults).toEqual([{ path: 'line 1', says: 'is missing: the file is empty.' }])
    expect(readRoster(utf8('\n\nname,email\nA,b@c.de\n')).faults[0]).toEqual({ path: 'line 3', says: 'should name the columns; candidate_number, given_name, family_name are not there.' })
    expect(readRoster(utf8(head)).faults[0]?.path).toBe('the file')
    expect(readRoster(utf8(`email,${head}a@b.cd,1,A,B,\n`)).faults[0]?.says).toContain('email twice')
    expect(readRoster(Uint8Array.of(0x50, 0x4b, 3, 4, 0, 0)).faults[0]?.says).toContain('not a text file')
  })

  it('notices a separator inside a name and a quotation mark left open', () => {
    expect(readRoster(utf8(`${head}1,Ana,Lund, Jr,a@b.cd\n`)).faults).toEqual([{ path: 'line 2', says: expect.stringContaining('more fields') }])
    expect(readRoster(utf8(`${head}1,"Ana,Lund,a@b.cd\n2,Per,Lund,\n`)).faults).toEqual([{ path: 'line 2', says: expect.stringContaining('quotation mark') }])
  })

  it('gives back whatever list is written, with any separator', () => {
    const word = fc.stringMatching(/^[A-Za-zÀ-ÿ'",; -]{1,20}$/).map((text) => text.normalize('NFC').replace(/\s+/g, ' ').trim()).filter((text) => text !== '')
    fc.assert(fc.property(fc.uniqueArray(fc.integer({ min: 0, max: 99999 }), { minLength: 1 }), word, word, fc.constantFrom(',', ';', '\t'), (numbers, given, family, delimiter) => {
      const rows = numbers.map((number) => ({ candidate_number: String(number).padStart(5, '0'), given_name: given, family_name: family, email: '' }))
      const { lines, faults } = readRoster(utf8(Papa.unparse(rows, { delimiter })))
      expect(faults).toEqual([])
      expect(lines.map((line) => [line.candidateNumber, line.givenName, line.familyName])).toEqual(rows.map((row) => [row.candidate_number, given, family]))
    }))
  })
})

describe('planning an import', () => {
  const known = (over: Partial<KnownStudent>): KnownStudent => ({ id: 'z', candidateNumber: '0073', givenName: 'Zoë', familyName: 'Brontë-Hale', email: 'zoe@example.org', inClass: true, ours: true, ...over })
  const roster = readRoster(utf8(`${head}0073,Zoë,Brontë-Hale,zoe@example.org\n`))

  it('tells new, unchanged, joining and changed apart', () => {
    const does = (students: KnownStudent[]) => planRoster(roster, students).steps.map((step) => [step.does, step.studentId, step.was])
    expect(does([])).toEqual([['new', null, null]])
    expect(does([known({ candidateNumber: '73' })])).toEqual([['new', null, null]])
    expect(does([known({})])).toEqual([['unchanged', 'z', null]])
    expect(does([known({ inClass: false, ours: false })])).toEqual([['joins', 'z', null]])
    expect(does([known({ familyName: 'Hale', email: null })])).toEqual([['changed', 'z', 'Zoë Hale, no e-mail']])
  })

  it('leaves alone whom the file does not name, and addresses when it has no such column', () => {
    expect(planRoster(roster, [known({}), known({ id: 'y', candidateNumber: '1' })]).leftAlone).toBe(1)
    const without = readRoster(utf8('candidate_number,given_name,family_name\n0073,Zoë,Brontë-Hale\n'))
    expect(planRoster(without, [known({})]).steps[0]).toMatchObject({ does: 'unchanged', email: 'zoe@example.org' })
  })

  it('does not change a student of somebody else’s class', () => {
    const plan = planRoster(roster, [known({ givenName: 'Noor', inClass: false, ours: false })])
    expect(plan.steps).toEqual([])
    expect(plan.faults).toEqual([{ path: 'line 2', says: expect.stringContaining('0073') }])
    expect(plan.faults[0]?.says).not.toContain('Noor')
  })
})
