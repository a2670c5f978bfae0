/** A reference to an object of the file. */
export class PdfRef {
  constructor(readonly number: number, readonly generation: number) {}
}

/** A stream: its dictionary, and where its coded bytes lie in the file; `broken` where the file ends before the stream does. Its bytes are read only when asked for. */
export class PdfStream {
  constructor(readonly dict: PdfDict, readonly number: number, readonly generation: number, readonly at: number, readonly length: number, readonly broken = false) {}
}

/** Names are strings without their slash; strings of the file are bytes. */
export type PdfValue = null | boolean | number | string | Uint8Array | PdfRef | PdfStream | readonly PdfValue[] | PdfDict
export type PdfDict = ReadonlyMap<string, PdfValue>

/** The file says something that cannot be followed. It is met by trying another way, and is never shown to a person. */
export class Malformed extends Error {}
/** A part of what is asked for lies beyond the end of the file. */
export class Incomplete extends Malformed {}
/** Something would take more memory or time than one page may have. */
export class TooLarge extends Error {}

export function isDict(value: PdfValue | undefined): value is PdfDict {
  return value instanceof Map
}
export function isList(value: PdfValue | undefined): value is readonly PdfValue[] {
  return Array.isArray(value)
}
