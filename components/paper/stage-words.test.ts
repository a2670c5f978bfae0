import { describe, expect, it } from 'vitest'
import { stageNames, type PaperCounts } from '@/lib/core/paper-stages'
import { stageWords } from './stage-words'

const none: PaperCounts = {
  questions: 0, marks: 0, sheaves: 0, sheavesReading: 0, sheavesFailed: 0, leaves: 0, looseSheets: 0, scripts: 0, namesOpen: 0, pagesMissing: 0,
  answersLeft: 0, answersMarked: 0, sampled: 0, sampleRead: 0, returned: 0,
}
const said = (counts: Partial<PaperCounts>) => stageNames.map((name) => stageWords[name]({ ...none, ...counts }))

describe('the words of the stage line', () => {
  it('says what is left in plain counts', () => {
    const counts = { questions: 11, marks: 40, sheaves: 1, leaves: 59, looseSheets: 4, namesOpen: 2, scripts: 29, answersLeft: 15, answersMarked: 200, sampled: 15, sampleRead: 9 }
    expect(said(counts)).toEqual(['11 questions, 20 marks', '59 leaves', '4 loose sheets', '15 answers left', '9 of 15 read', '29 scripts'])
  })
  it('says one of a thing in the singular, and halves as ½', () => {
    expect(said({ questions: 1, marks: 1, sheaves: 1, leaves: 1, looseSheets: 1, answersLeft: 1, scripts: 1 }))
      .toEqual(['1 question, ½ mark', '1 leaf', '1 loose sheet', '1 answer left', '–', '1 script'])
    expect(said({ questions: 3, marks: 29 })[0]).toBe('3 questions, 14½ marks')
  })
  it('says that nothing is there before a sheaf, and that nothing is left at the end', () => {
    expect(said({})).toEqual(['no questions yet', 'no sheaf yet', '–', '–', '–', '–'])
    expect(said({ sheaves: 1, sheavesReading: 1 })[1]).toBe('reading')
    expect(said({ sheaves: 1, leaves: 4, scripts: 2, answersMarked: 4, returned: 2 }).slice(1)).toEqual(['4 leaves', 'nothing loose', 'all marked', 'no sample yet', '2 of 2 returned'])
  })
  it('leads from loose sheets to names to missing pages', () => {
    expect(said({ leaves: 4, scripts: 2, namesOpen: 1, pagesMissing: 3 })[2]).toBe('1 name to confirm')
    expect(said({ leaves: 4, scripts: 2, pagesMissing: 3 })[2]).toBe('3 pages missing')
  })
})
