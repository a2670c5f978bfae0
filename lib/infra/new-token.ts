import { randomInt } from 'node:crypto'
import { tokenLength, tokenLetters } from '@/lib/core/printed-code'

/** A token for a printed page: drawn at random, so it says nothing of anyone and no other can be guessed from it. */
export function newToken(): string {
  return Array.from({ length: tokenLength }, () => tokenLetters[randomInt(tokenLetters.length)]).join('')
}
