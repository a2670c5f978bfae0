const mmAnInch = 25.4
/** A scan's longest side in inches lies between these: a slip, and A3 with room to spare. */
const shortest = 4
const longest = 18
const a4 = { long: 297 / mmAnInch, ratio: 297 / 210 }
const letter = { long: 11, ratio: 11 / 8.5 }

/**
 * Dots per inch of a picture. What the file says is believed when a sheet of paper comes of it; cameras and programs often say 72
 * whatever they took. Otherwise the picture is taken for a whole sheet, A4 or Letter by its proportion.
 */
export function paperDensity(width: number, height: number, dpiX: number, dpiY: number): { dpiX: number; dpiY: number } {
  const inches = Math.max(width / dpiX, height / dpiY)
  if (dpiX > 0 && dpiY > 0 && inches >= shortest && inches <= longest) return { dpiX, dpiY }
  const [long, short] = [Math.max(width, height), Math.min(width, height)]
  const ratio = long / short
  const sheet = Math.abs(ratio - letter.ratio) < Math.abs(ratio - a4.ratio) ? letter : a4
  const dpi = long / sheet.long
  return { dpiX: dpi, dpiY: dpi }
}
