import type { PDFDocument } from 'pdf-lib'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import type { Actor } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'
import { drawMarkedPage } from '@/lib/handing-back/marked-page'
import type { Drawing } from '@/lib/handing-back/paint-ink'
import { buildReturnedScript, loadSheaf } from '@/lib/handing-back/returned-script'
import { openAnnotatedScript } from '@/lib/tasks/open-annotated-script'
import { aScriptPage, aStampAt, aSummary, truthPages } from '@/tests/make/a-script-to-return'
import { aSheaf, laidOnSide, turned } from '@/tests/make/a-sheaf'
import { aMarkedClassSet } from '@/tests/make/marked-class-set'
import { annotationsOf, asFile, assertClean, codedImages, greenInk, imageCount, pageCountOf, wordsOf, type InkBox } from '@/tests/make/pdf-tools'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

const leaves = truthPages()
const upright = leaves.find((page) => page.rotation === 0)!
const upsideDown = leaves.find((page) => page.rotation === 180)!
const at = new Date('2026-03-17T09:30:00Z')
const mmPerPixel = 25.4 / 200

function marking(leaf: typeof upright): Drawing[] {
  const press = (kind: string, x: number, y: number, more = {}) => ({ stamp: aStampAt(x, y, { kind, worth: 0, ...more }), pen: 'first' as const, label: '1a' })
  return drawMarkedPage({
    paper: { width: 595.28, height: 841.89 }, image: { width: leaf.width_px, height: leaf.height_px }, homography: leaf.homography, marks: [], total: null,
    stamps: [press('tick', 431, 287, { worth: 2 }), press('note', 210, 330, { text: 'Zoë: look at √2' }), press('pen', 0, 0, { path: [150, 400, 180, 420, 240, 390, 300, 430] }), press('ring', 200, 500, { w: 80, h: 40 })],
  })
}

async function file(sheaf: PDFDocument, leaf: typeof upright, annotated: boolean): Promise<string> {
  const sheaves = new Map([['everyday', await loadSheaf(await sheaf.save())]])
  const signing = annotated ? () => ({ author: 'R. Adeyemi', at }) : null
  return asFile(await buildReturnedScript(sheaves, { summary: aSummary(), pages: [aScriptPage(leaf, { index: 0, drawings: marking(leaf) })], builtAt: at, signing }))
}

const cases: readonly (readonly [string, typeof upright, (pdf: PDFDocument) => PDFDocument])[] = [
  ['a skewed page', upright, (pdf) => pdf],
  ['a page scanned upside down', upsideDown, (pdf) => pdf],
  ['a page with /Rotate 90', upright, (pdf) => turned(pdf, 90)],
  ['a page whose image lies on its side', upright, laidOnSide],
]

describe('marking as annotations', () => {
  it.each(cases)('lies where drawn marking lies, on %s, in two viewers', async (_, leaf, prepare) => {
    const drawn = await file(prepare(await aSheaf([leaf.index])), leaf, false)
    const annotated = await file(prepare(await aSheaf([leaf.index])), leaf, true)
    assertClean(annotated)
    for (const by of ['poppler', 'mupdf'] as const) {
      const [expected, found] = [greenInk(drawn, 2, by), greenInk(annotated, 2, by)]
      for (const edge of ['left', 'right', 'top', 'bottom'] as const satisfies readonly (keyof InkBox)[]) expect(Math.abs(found[edge] - expected[edge]) * mmPerPixel).toBeLessThan(0.3)
    }
  })

  it('is listed by another program with author, date and words, and only there', async () => {
    const annotated = await file(await aSheaf([upright.index]), upright, true)
    const listed = annotationsOf(annotated, 2)
    expect(listed.map(({ type, author, contents, modified }) => ({ type, author, contents, modified }))).toEqual([
      { type: 'Stamp', author: 'R. Adeyemi', contents: 'Tick, one mark', modified: at.getTime() },
      { type: 'FreeText', author: 'R. Adeyemi', contents: 'Zoë: look at √2', modified: at.getTime() },
      { type: 'Ink', author: 'R. Adeyemi', contents: 'Pen line', modified: at.getTime() },
      { type: 'Ink', author: 'R. Adeyemi', contents: 'Ring', modified: at.getTime() },
    ])
    expect(annotationsOf(await file(await aSheaf([upright.index]), upright, false), 2)).toEqual([])
  })
})

describe('the annotated copy of a script', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)

  const hide = (paperId: string, hidden: boolean) => db()('papers').where({ id: paperId }).update({ names_hidden: hidden ? 1 : 0 })
  const asMarker = async (paperId: string, questionId: string): Promise<Actor> => {
    const marker = await anActor('marker')
    await db()('paper_markers').insert({ id: newId(), paper_id: paperId, user_id: marker.userId, question_id: questionId })
    return marker
  }
  const listedIn = (bytes: Uint8Array) => {
    const path = asFile(bytes)
    assertClean(path)
    return { path, listed: Array.from({ length: pageCountOf(path) }, (_, k) => annotationsOf(path, k + 1)).flat() }
  }

  it('gives its owner the summary and every mark by the name of who gave it, on untouched pages', async () => {
    const teacher = await anActor('teacher')
    const { scripts, scan, questionIds } = await aMarkedClassSet(teacher, 1)
    const { bytes, name } = await openAnnotatedScript(teacher, scripts[0]!.scriptId)
    const { path, listed } = listedIn(bytes)
    expect(name).toMatch(/annotated\.pdf$/)
    expect(wordsOf(path, 1)).toContain('copy for staff, marked by R. Test')
    expect(codedImages(path)).toEqual(scripts[0]!.leaves.flatMap((index) => codedImages(scan, index + 1, index + 1)))
    expect(listed.filter(({ contents }) => contents.startsWith('Tick'))).toHaveLength(questionIds.length)
    expect(listed.filter(({ contents }) => contents.startsWith('Mark '))).toHaveLength(questionIds.length)
    expect(new Set(listed.filter(({ contents }) => !contents.startsWith('Page total')).map(({ author }) => author))).toEqual(new Set(['R. Test']))
  })

  it('gives a marker the marks of their own questions, and covered pages while names are hidden', async () => {
    const teacher = await anActor('teacher')
    const { paperId, scripts, questionIds, scan } = await aMarkedClassSet(teacher, 1)
    const marker = await asMarker(paperId, questionIds[0]!)
    await hide(paperId, true)
    const covered = await openAnnotatedScript(marker, scripts[0]!.scriptId)
    const { path, listed } = listedIn(covered.bytes)
    expect(covered.name).toMatch(/, script 1, annotated/)
    expect(listed.map(({ contents }) => contents.split(',')[0])).toEqual(['Tick', expect.stringMatching(/^Mark /)])
    expect(imageCount(path)).toBe(2)
    const originals = scripts[0]!.leaves.flatMap((index) => codedImages(scan, index + 1, index + 1))
    expect(codedImages(path).some((image) => originals.includes(image))).toBe(false)
    await hide(paperId, false)
    expect(codedImages(listedIn((await openAnnotatedScript(marker, scripts[0]!.scriptId)).bytes).path)).toEqual(originals)
  })

  it('shows a moderator no mark of an answer they have still to read blind, and nothing outside their sample', async () => {
    const teacher = await anActor('teacher')
    const { classSetId, scripts, questionIds } = await aMarkedClassSet(teacher, 2)
    const moderator = await anActor('moderator')
    const sample = newId()
    await db()('samples').insert({ id: sample, class_set_id: classSetId, moderator_id: moderator.userId, seed: 's', size: 1, default_size: 1, tolerance: 1, drawn_by: teacher.userId, drawn_at: 1 })
    await db()('sample_scripts').insert({ sample_id: sample, script_id: scripts[0]!.scriptId, position: 0, drawn_as: 'spread' })
    expect(listedIn((await openAnnotatedScript(moderator, scripts[0]!.scriptId)).bytes).listed).toEqual([])
    const { id: response } = await db()('responses').where({ script_id: scripts[0]!.scriptId, question_id: questionIds[0]! }).first<{ id: string }>('id')
    await db()('markings').insert({ id: newId(), response_id: response, round: 'second', marker_id: moderator.userId, state: 'settled', created_at: 1, settled_at: 1 })
    expect(listedIn((await openAnnotatedScript(moderator, scripts[0]!.scriptId)).bytes).listed).toHaveLength(2)
    await expect(openAnnotatedScript(moderator, scripts[1]!.scriptId)).rejects.toMatchObject({ code: 'not_allowed' })
  })

  it('is nobody else’s: not a student’s, an admin’s or another teacher’s', async () => {
    const { scripts } = await aMarkedClassSet(await anActor('teacher'), 1)
    for (const role of ['student', 'admin', 'teacher', 'marker', 'moderator'] as const) await expect(openAnnotatedScript(await anActor(role), scripts[0]!.scriptId)).rejects.toMatchObject({ code: 'not_found' })
    await expect(openAnnotatedScript(await anActor('teacher'), newId())).rejects.toMatchObject({ code: 'not_found' })
  })
})

