import type { GreyPicture } from '@/lib/core/grey-picture'
import { withMats, type Cv } from './opencv'
import { boxShrink, matOf, pictureOf } from './shrink'

/** A picture with its paper made evenly white, and its ink at a quarter of the density: 0 none, 255 black on white. */
export type Levelled = Readonly<{ white: GreyPicture; ink: GreyPicture }>

/** Darker than this nothing is paper: the scanner's lid, or what lies beyond the sheet. */
const darkestPaper = 90

/**
 * Levels a 100 dpi picture. The paper's brightness is what a closing of 9 mm leaves of it at 25 dpi, so strokes and letters
 * vanish from it and shades, tinted paper and the copier's lid stay. Grey, colour and 1-bit scans come out alike.
 */
export function level(cv: Cv, picture: GreyPicture): Levelled {
  const small = boxShrink(picture, 4)
  const paper = withMats(cv, (keep) => {
    const mat = keep(matOf(cv, small))
    const kernel = keep(cv.Mat.ones(9, 9, cv.CV_8U))
    cv.morphologyEx(mat, mat, cv.MORPH_CLOSE, kernel)
    cv.blur(mat, mat, new cv.Size(5, 5))
    return pictureOf(mat)
  })
  return { white: whitened(picture, paper), ink: inkOf(small, paper) }
}

function whitened({ width, height, data }: GreyPicture, paper: GreyPicture): GreyPicture {
  const out = new Uint8Array(data.length)
  const gain = Float32Array.from(paper.data, (v) => (v < darkestPaper ? 1000 : 255 / v))
  for (let y = 0; y < height; y++) {
    const row = Math.min(paper.height - 1, y >> 2) * paper.width
    for (let x = 0, at = y * width; x < width; x++, at++) {
      const v = data[at]! * gain[row + Math.min(paper.width - 1, x >> 2)]!
      out[at] = v > 255 ? 255 : v
    }
  }
  return { width, height, data: out }
}

function inkOf(small: GreyPicture, paper: GreyPicture): GreyPicture {
  const data = new Uint8Array(small.data.length)
  for (let k = 0; k < data.length; k++) {
    const white = paper.data[k]!
    const ink = white < darkestPaper ? 0 : ((white - small.data[k]!) * 255) / white
    data[k] = ink < 0 ? 0 : ink
  }
  return { ...small, data }
}
