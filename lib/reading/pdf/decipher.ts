import { createDecipheriv, createHash } from 'node:crypto'
import { fileKey } from './file-key'
import { rc4 } from './rc4'
import { isDict, type PdfDict, type PdfValue } from './value'

type Method = 'none' | 'rc4' | 'aes' | 'aes256'
/** Undoes the enciphering of an object's strings and streams. */
export type Decipher = Readonly<{ string: (bytes: Uint8Array, number: number, generation: number) => Uint8Array; stream: (bytes: Uint8Array, number: number, generation: number) => Uint8Array }>

/** The decipherer of a file that opens with an empty password, by its /Encrypt (without references) and the first half of its /ID; null when it asks for a password. */
export function decipherOf(encrypt: PdfDict, id: Uint8Array): Decipher | null {
  const key = fileKey(encrypt, id)
  if (!key) return null
  const by = (method: Method) => (bytes: Uint8Array, number: number, generation: number) => decipher(bytes, method, key, number, generation)
  return { string: by(methodOf(encrypt, 'StrF')), stream: by(methodOf(encrypt, 'StmF')) }
}

function methodOf(encrypt: PdfDict, use: 'StrF' | 'StmF'): Method {
  const version = encrypt.get('V')
  if (version !== 4 && version !== 5) return 'rc4'
  const filters = encrypt.get('CF')
  const filter = isDict(filters) ? filters.get(nameOf(encrypt.get(use))) : null
  const method = isDict(filter) ? filter.get('CFM') : null
  return method === 'V2' ? 'rc4' : method === 'AESV2' ? 'aes' : method === 'AESV3' ? 'aes256' : 'none'
}

function decipher(bytes: Uint8Array, method: Method, key: Buffer, number: number, generation: number): Uint8Array {
  if (method === 'none') return bytes
  if (method === 'aes256') return aes('aes-256-cbc', key, bytes)
  const tail = [number & 255, (number >> 8) & 255, (number >> 16) & 255, generation & 255, (generation >> 8) & 255]
  const salt = method === 'aes' ? Buffer.from('sAlT', 'latin1') : Buffer.alloc(0)
  const own = createHash('md5').update(Buffer.concat([key, Buffer.from(tail), salt])).digest().subarray(0, Math.min(16, key.length + 5))
  return method === 'rc4' ? rc4(own, bytes) : aes('aes-128-cbc', own, bytes)
}

/** The first block starts the chain. What breaks off gives its whole blocks. */
function aes(kind: 'aes-128-cbc' | 'aes-256-cbc', key: Buffer, bytes: Uint8Array): Uint8Array {
  const length = (bytes.length - 16) & ~15
  if (length <= 0) return new Uint8Array()
  const decipher = createDecipheriv(kind, key, bytes.subarray(0, 16)).setAutoPadding(false)
  const clear = Buffer.concat([decipher.update(bytes.subarray(16, 16 + length)), decipher.final()])
  const padding = clear.at(-1)!
  return padding >= 1 && padding <= 16 ? clear.subarray(0, clear.length - padding) : clear
}

function nameOf(value: PdfValue | undefined): string {
  return typeof value === 'string' ? value : ''
}
