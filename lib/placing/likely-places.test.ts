import { describe, expect, it } from 'vitest'
import { likelyPlaces, type PiledScript } from './likely-places'

const script = (id: string, ...pages: [paperPage: number, position: number][]): PiledScript => ({ id, pages: pages.map(([paperPage, position]) => ({ paperPage, position })) })
const absent = [{ classSetId: 'c', studentId: 'absent' }]
const targets = (...places: ReturnType<typeof likelyPlaces>) => places.map(({ target }) => ('scriptId' in target ? target.scriptId : target.studentId))

describe('the likeliest places of a loose sheet', () => {
  const pile = [script('whole', [1, 44], [2, 45]), script('two back', [1, 46]), script('just before', [1, 47]), script('after', [1, 49], [2, 50])]

  it('offers the scripts nearest before it that lack its page, then a student without a script', () => {
    const places = likelyPlaces({ position: 48, paperPage: 2, secondScan: false }, pile, absent)
    expect(targets(...places)).toEqual(['just before', 'two back', 'absent'])
    expect(places.map(({ reason, apart }) => `${reason} ${apart}`)).toEqual(['follows 1', 'follows 2', 'no_script 0'])
  })

  it('never offers a script that has that page, unless the sheet is a second scan', () => {
    expect(targets(...likelyPlaces({ position: 46, paperPage: 2, secondScan: false }, [pile[0]!], []))).toEqual([])
    expect(likelyPlaces({ position: 46, paperPage: 2, secondScan: true }, [pile[0]!], [])).toEqual([{ target: { scriptId: 'whole' }, reason: 'second_scan', apart: 1 }])
  })

  it('keeps a place for a script not begun when the sheet may be a first page', () => {
    const lacking = [script('a', [2, 9]), script('b', [2, 11]), script('c', [2, 7])]
    expect(targets(...likelyPlaces({ position: 10, paperPage: 1, secondScan: false }, lacking, absent))).toEqual(['a', 'b', 'absent'])
  })

  it('leaves out scripts of other sheaves', () => {
    expect(likelyPlaces({ position: 3, paperPage: 2, secondScan: false }, [{ id: 'elsewhere', pages: [{ paperPage: 1, position: null }] }], [])).toEqual([])
  })
})
