/** One image object of a page: its dictionary without sizes of bytes, its bytes, and which share of the page's height it takes, from the top. */
export type PicturePart = Readonly<{ dict: string; data: Uint8Array; from: number; to: number }>

/**
 * A picture that becomes a page: its pixels as stored, their density, how it is to be shown (EXIF and TIFF orientation, 1 to 8), and the
 * image objects that make it.
 */
export type PagePicture = Readonly<{ width: number; height: number; dpiX: number; dpiY: number; orientation: number; parts: readonly PicturePart[] }>

/** A page whose picture cannot be used: an image that no reader can draw, so that it is reported and never taken for an empty page. */
export function brokenPicture(width: number, height: number): PagePicture {
  const part = { dict: `/Width ${Math.max(1, width)}/Height ${Math.max(1, height)}/ColorSpace/DeviceGray/BitsPerComponent 8/Filter/DCTDecode`, data: Buffer.from('cannot be read'), from: 0, to: 1 }
  return { width: Math.max(1, width), height: Math.max(1, height), dpiX: 0, dpiY: 0, orientation: 1, parts: [part] }
}
