import type { GreyPicture } from '@/lib/core/grey-picture'
import { withMats, type Cv } from './opencv'

/** A picture made smaller: a pixel (x, y) of it is (x * byX, y * byY) of the one it came from, in corner-based pixels. */
export type Shrunk = Readonly<{ picture: GreyPicture; byX: number; byY: number }>

/** Means of n x n boxes; what is left over at the right and lower edge is dropped. */
export function boxShrink({ width, height, data }: GreyPicture, n: number): GreyPicture {
  const w = Math.max(1, Math.floor(width / n))
  const h = Math.max(1, Math.floor(height / n))
  const sums = new Uint32Array(w)
  const out = new Uint8Array(w * h)
  const area = n * n
  for (let y = 0; y < h; y++) {
    sums.fill(0)
    for (let k = 0; k < n; k++) {
      let at = (y * n + k) * width
      for (let x = 0; x < w; x++) for (let j = 0; j < n; j++) sums[x]! += data[at++]!
    }
    for (let x = 0; x < w; x++) out[y * w + x] = sums[x]! / area
  }
  return { width: w, height: h, data: out }
}

/** Brings a picture of so many dots per inch to `dpi`: by boxes where the ratio is whole, else by area. */
export function shrinkTo(cv: Cv, picture: GreyPicture, dpiX: number, dpiY: number, dpi: number): Shrunk {
  const n = Math.round(dpiX / dpi)
  if (n >= 1 && Math.abs(dpiX / dpi - n) < 0.02 * n && Math.abs(dpiY / dpi - n) < 0.02 * n)
    return { picture: n === 1 ? picture : boxShrink(picture, n), byX: n, byY: n }
  const width = Math.max(1, Math.round((picture.width * dpi) / dpiX))
  const height = Math.max(1, Math.round((picture.height * dpi) / dpiY))
  return withMats(cv, (keep) => {
    const from = keep(matOf(cv, picture))
    const to = keep(new cv.Mat())
    cv.resize(from, to, new cv.Size(width, height), 0, 0, dpiX >= dpi ? cv.INTER_AREA : cv.INTER_LINEAR)
    return { picture: pictureOf(to), byX: picture.width / width, byY: picture.height / height }
  })
}

/** A copy of a grey picture in the vision engine's memory. */
export function matOf(cv: Cv, { width, height, data }: GreyPicture): InstanceType<Cv['Mat']> {
  const mat = new cv.Mat(height, width, cv.CV_8UC1)
  mat.data.set(data)
  return mat
}
/** A copy of a grey Mat outside of it. */
export function pictureOf(mat: InstanceType<Cv['Mat']>): GreyPicture {
  return { width: mat.cols, height: mat.rows, data: new Uint8Array(mat.data) }
}
