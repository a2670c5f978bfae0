import { describe, expect, it } from 'vitest'
import { readContent } from './content-reader'
import { usedNames } from './own-resources'

const bytes = (text: string): Uint8Array => Buffer.from(text, 'latin1')
const operators = (text: string): string[] => [...readContent(bytes(text))].map(({ operator }) => operator)

describe('content is read', () => {
  it('with numbers and names before their operator', () => {
    expect([...readContent(bytes('q .5 0 -0.0 +2 10 20.25 cm\n/Im#30 Do Q'))]).toEqual([
      { operator: 'q', operands: [] },
      { operator: 'cm', operands: [0.5, 0, 0, 2, 10, 20.25] },
      { operator: 'Do', operands: [{ name: 'Im#30' }] },
      { operator: 'Q', operands: [] },
    ])
  })

  it('past strings, comments and dictionaries that look like operators', () => {
    expect(operators('(a \\) /X Do (b) ) Tj % /Y Do\n<2F5A> Tj /P <</MCID 1 /A (/Z Do)>> BDC EMC')).toEqual(['Tj', 'Tj', 'BDC', 'EMC'])
  })

  it('past the bytes of an inline image, which may look like anything', () => {
    expect(operators('BI /W 2 /H 1 /BPC 8 /CS /G ID /Q Do EI( q\u0000\u00ff EI Q')).toEqual(['BI', 'Q'])
  })

  it('to its end when it breaks off in a string, an array or an image', () => {
    for (const text of ['(open', '[1 2', 'BI /W 1 ID abc', '<41', '/']) expect(() => operators(text)).not.toThrow()
  })
})

describe('the resources that content uses', () => {
  it('are told by operator, so that a name of one kind does not bring in another', () => {
    const used = usedNames(bytes('/A gs /B Do /C cs /D scn /E 12 Tf /F sh /G BMC (/H Do) Tj'))
    expect(Object.fromEntries([...used].map(([kind, names]) => [kind, [...names]]))).toEqual({ ExtGState: ['A'], XObject: ['B'], ColorSpace: ['C'], Pattern: ['D'], Font: ['E'], Shading: ['F'] })
  })
})
