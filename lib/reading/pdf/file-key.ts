import { createCipheriv, createDecipheriv, createHash } from 'node:crypto'
import { rc4 } from './rc4'
import type { PdfDict, PdfValue } from './value'

/** What an empty password is filled up with (ISO 32000-1, algorithm 2). */
const filling = Buffer.from('28bf4e5e4e758a4164004e56fffa01082e2e00b6d0683e802f0ca9fe6453697a', 'hex')
const none = Buffer.alloc(0)
const md5 = (...parts: Uint8Array[]) => createHash('md5').update(Buffer.concat(parts)).digest()
const sha256 = (...parts: Uint8Array[]) => createHash('sha256').update(Buffer.concat(parts)).digest()

/** The key of a file that opens with an empty password; null when it asks for one, or is enciphered in a way not known here. */
export function fileKey(encrypt: PdfDict, id: Uint8Array): Buffer | null {
  const bytes = (key: string): Uint8Array => bytesOf(encrypt.get(key))
  const revision = encrypt.get('R')
  if (encrypt.get('Filter') !== 'Standard' || typeof revision !== 'number') return null
  if (revision >= 5) return newKey(bytes('U'), bytes('UE'), revision >= 6)
  const version = encrypt.get('V')
  const said = encrypt.get('Length')
  const length = version === 1 ? 5 : Math.min(16, Math.max(5, (typeof said === 'number' ? said : version === 4 ? 128 : 40) >> 3))
  const permissions = Buffer.alloc(4)
  permissions.writeInt32LE(Number(encrypt.get('P')) | 0)
  const open = revision >= 4 && encrypt.get('EncryptMetadata') === false ? Buffer.alloc(4, 255) : none
  let key = md5(filling, bytes('O').subarray(0, 32), permissions, id, open).subarray(0, length)
  if (revision >= 3) for (let k = 0; k < 50; k++) key = md5(key).subarray(0, length)
  return oldCheck(key, id, revision).equals(bytes('U').subarray(0, revision >= 3 ? 16 : 32)) ? key : null
}

/** What /U has to begin with when the key is right (algorithms 4 and 5). */
function oldCheck(key: Buffer, id: Uint8Array, revision: number): Buffer {
  if (revision < 3) return Buffer.from(rc4(key, filling))
  let value: Uint8Array = md5(filling, id)
  for (let k = 0; k < 20; k++) value = rc4(key.map((b) => b ^ k), value)
  return Buffer.from(value)
}

/** AES-256 (ISO 32000-2, algorithm 2.A). */
function newKey(u: Uint8Array, ue: Uint8Array, hardened: boolean): Buffer | null {
  if (u.length < 48 || ue.length < 32) return null
  const hash = hardened ? hardHash : sha256
  if (!hash(u.subarray(32, 40)).equals(u.subarray(0, 32))) return null
  const decipher = createDecipheriv('aes-256-cbc', hash(u.subarray(40, 48)), Buffer.alloc(16)).setAutoPadding(false)
  return Buffer.concat([decipher.update(ue.subarray(0, 32)), decipher.final()])
}

/** ISO 32000-2, algorithm 2.B, for the empty password. */
function hardHash(salt: Uint8Array): Buffer {
  let key = sha256(salt)
  for (let round = 0, last = 0; round < 64 || last > round - 32; round++) {
    const block = Buffer.concat(Array.from({ length: 64 }, () => key))
    const cipher = createCipheriv('aes-128-cbc', key.subarray(0, 16), key.subarray(16, 32)).setAutoPadding(false)
    const mixed = cipher.update(block)
    const sum = mixed.subarray(0, 16).reduce((total, b) => total + b, 0)
    key = createHash(['sha256', 'sha384', 'sha512'][sum % 3]!).update(mixed).digest()
    last = mixed.at(-1)!
  }
  return key.subarray(0, 32)
}

function bytesOf(value: PdfValue | undefined): Uint8Array {
  return value instanceof Uint8Array ? value : none
}
