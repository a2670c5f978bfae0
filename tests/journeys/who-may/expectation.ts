import { everyone, type Who } from './people'

/**
 * What a door is to answer to each person, in the order of `everyone`, parted by blanks. A number is a status (of an action: that of
 * its code), a word a code; `in` leads to the sign-in page, `my` to the student's own page and `home` to that of the staff; `-` is not asked, since it would change
 * the demo school.
 */
export type Expected = string

/** What came back: `code` is that of the answer, or where it leads; `forOneOnly` whether no cache may give it to anyone else. */
export type Answer = Readonly<{ status: number; code: string; body: string; forOneOnly: boolean }>

/** The expected word for each person. Throws when a row does not speak of everyone. */
export function wordsOf(expected: Expected): ReadonlyMap<Who, string> {
  const words = expected.trim().split(/\s+/)
  if (words.length !== everyone.length) throw new Error(`"${expected}" has to speak of ${everyone.length} people`)
  return new Map(everyone.map((who, k) => [who, words[k]!]))
}

export function fits(word: string, { status, code }: Answer): boolean {
  return word === String(status) || word === code
}

/** Whether a word says that this person is turned away. */
export function isRefusal(word: string): boolean {
  return ['in', 'my', 'home', '401', '403', '404'].includes(word)
}
