import { PDFArray, PDFDict, PDFName, PDFRawStream, PDFRef, PDFStream, type PDFContext, type PDFObject } from 'pdf-lib'
import { decoded, ownResources } from './own-resources'

/** Of an image or form, only what draws it. Metadata, alternates, layers and structure of the sheaf stay behind. */
const imageKeys = ['Type', 'Subtype', 'Width', 'Height', 'BitsPerComponent', 'ColorSpace', 'Decode', 'DecodeParms', 'Filter', 'ImageMask', 'Mask', 'SMask', 'SMaskInData', 'Matte', 'Intent', 'Interpolate', 'Length']
const formKeys = ['Type', 'Subtype', 'FormType', 'BBox', 'Matrix', 'Group', 'Filter', 'DecodeParms', 'Length']
const patternKeys = ['Type', 'PatternType', 'PaintType', 'TilingType', 'BBox', 'XStep', 'YStep', 'Matrix', 'Filter', 'DecodeParms', 'Length']
/** Never copied, wherever it stands: it leads out of the page, to other pages or to things that act. */
const never = new Set(['Metadata', 'PieceInfo', 'StructParent', 'StructParents', 'AF', 'Annots', 'AA', 'A', 'OC', 'OPI', 'Alternates', 'LastModified', 'Parent', 'Resources', 'Names', 'JS', 'EF', 'Measure', 'PtData', 'OpenAction'])
const neverTypes = new Set(['Page', 'Pages', 'Catalog', 'Annot', 'Filespec', 'EmbeddedFile', 'Metadata', 'Action'])

/**
 * Copies what a page draws from a sheaf into a student's file. Streams keep their bytes. Unlike a plain deep copy it never follows a shared
 * or inherited resource list further than the content does, so that no other student's picture comes along.
 */
export class ObjectCopier {
  private readonly copied = new Map<PDFRef, PDFRef | null>()

  constructor(
    private readonly source: PDFContext,
    private readonly target: PDFContext,
  ) {}

  /** A copy of any object; null for one that must not leave the sheaf. `around` is the resources a form without its own falls back on. */
  copy(value: PDFObject, around?: PDFDict): PDFObject | null {
    if (value instanceof PDFRef) return this.copyRef(value, around)
    if (value instanceof PDFStream) return this.copyStream(value, around)
    if (value instanceof PDFDict) return this.copyDict(value)
    if (value instanceof PDFArray) return this.copyArray(value)
    return value
  }

  /** Resources cut down to what `content` uses, and copied. */
  copyResources(content: Uint8Array, resources: PDFDict | undefined): PDFDict {
    const own = ownResources(content, resources, this.source)
    const copy = PDFDict.withContext(this.target)
    for (const [kind, entries] of own.entries()) {
      const list = PDFDict.withContext(this.target)
      for (const [name, value] of (entries as PDFDict).entries()) {
        const kept = this.copy(value, resources)
        if (kept) list.set(name, kept)
      }
      copy.set(kind, list)
    }
    return copy
  }

  private copyRef(ref: PDFRef, around?: PDFDict): PDFRef | null {
    const known = this.copied.get(ref)
    if (known !== undefined) return known
    const value = this.source.lookup(ref)
    if (!value) return null
    const place = this.target.nextRef()
    this.copied.set(ref, place) // before what it holds: objects may point in circles
    const copy = this.copy(value, around)
    if (copy) this.target.assign(place, copy)
    else this.copied.set(ref, null)
    return copy ? place : null
  }

  private copyArray(array: PDFArray): PDFArray {
    const copy = PDFArray.withContext(this.target)
    for (const value of array.asArray()) copy.push(this.copy(value) ?? this.target.obj(null))
    return copy
  }

  private copyDict(dict: PDFDict): PDFDict | null {
    if (neverTypes.has(nameIn(dict, 'Type'))) return null
    const copy = this.entries(dict, dict.keys().map((key) => key.decodeText()))
    if (nameIn(dict, 'Subtype') === 'Type3') copy.set(PDFName.of('Resources'), this.copyResources(glyphContent(dict), dict.lookupMaybe(PDFName.of('Resources'), PDFDict)))
    return copy
  }

  private copyStream(stream: PDFStream, around?: PDFDict): PDFRawStream | null {
    if (!(stream instanceof PDFRawStream) || neverTypes.has(nameIn(stream.dict, 'Type'))) return null
    const draws = nameIn(stream.dict, 'Subtype') === 'Form' || stream.dict.has(PDFName.of('PatternType'))
    const copy = this.entries(stream.dict, draws ? [...formKeys, ...patternKeys] : nameIn(stream.dict, 'Subtype') === 'Image' ? imageKeys : stream.dict.keys().map((key) => key.decodeText()))
    if (draws) copy.set(PDFName.of('Resources'), this.copyResources(decoded(stream), stream.dict.lookupMaybe(PDFName.of('Resources'), PDFDict) ?? around))
    return PDFRawStream.of(copy, stream.contents)
  }

  private entries(dict: PDFDict, keys: readonly string[]): PDFDict {
    const copy = PDFDict.withContext(this.target)
    for (const name of new Set(keys)) {
      const key = PDFName.of(name)
      const value = never.has(name) ? undefined : dict.get(key)
      const kept = value && this.copy(value)
      if (kept) copy.set(key, kept)
    }
    return copy
  }
}

function nameIn(dict: PDFDict, key: string): string {
  const value = dict.lookup(PDFName.of(key))
  return value instanceof PDFName ? value.decodeText() : ''
}

/** All that a drawn (Type 3) font's glyphs draw. */
function glyphContent(font: PDFDict): Uint8Array {
  const glyphs = font.lookupMaybe(PDFName.of('CharProcs'), PDFDict)
  const streams = glyphs ? glyphs.keys().map((key) => glyphs.lookup(key)) : []
  return Buffer.concat(streams.flatMap((stream) => (stream instanceof PDFRawStream ? [decoded(stream), Uint8Array.of(10)] : [])))
}
