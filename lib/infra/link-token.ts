import { createHash, createHmac, randomInt } from 'node:crypto'
import { secrets } from './secrets'

/**
 * The token of a link sent by mail. Made from the link's id and the school's secret, so that neither the links nor the
 * mails that wait to be sent hold it: what the database knows opens nothing.
 */
export function tokenOfLink(linkId: string): string {
  return createHmac('sha256', secrets().session).update(`one-time-link ${linkId}`).digest('base64url')
}

// No letter or figure that is read as another on a printed slip.
const letters = 'ABCDEFGHJKMNPQRSTUVWXYZ23456789'

/** A code for a printed slip: twelve characters, about 59 bits. */
export function newCode(): string {
  const drawn = Array.from({ length: 12 }, () => letters[randomInt(letters.length)])
  return [0, 4, 8].map((from) => drawn.slice(from, from + 4).join('')).join('-')
}

/** What is stored of a token or code. A code may be typed in any case, with or without its dashes. */
export function hashOfToken(token: string): string {
  const bare = token.replace(/[\s-]/g, '').toUpperCase()
  const known = bare.length === 12 ? bare : token
  return createHash('sha256').update(known).digest('hex')
}
