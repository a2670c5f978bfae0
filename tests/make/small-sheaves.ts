import { execFileSync } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { deflateSync } from 'node:zlib'
import sharp from 'sharp'
import { jbig2 } from './jbig2'
import { onePage, rawPdf } from './raw-pdf'
import { tiffOf } from './tiff'

const [width, height] = [120, 168]
const box = '/MediaBox[0 0 60 84]'
const draw = 'q 60 0 0 84 0 0 cm /I Do Q'
const image = (dict: string, data: Uint8Array) => ({ dict: `/Type/XObject/Subtype/Image/Width ${width}/Height ${height} ${dict}`, data })
const grey8 = '/ColorSpace/DeviceGray/BitsPerComponent 8'

/** Small files of every make, a few kilobytes each: what mutations of them break is broken for large ones too. */
export async function smallSheaves(): Promise<Readonly<Record<string, Buffer>>> {
  const grey = Buffer.from(Array.from({ length: width * height }, (_, k) => ((k % width) + Math.floor(k / width)) % 23 < 3 ? 20 : 240))
  const jpeg = await sharp(grey, { raw: { width, height, channels: 1 } }).toColourspace('b-w').jpeg({ quality: 50 }).toBuffer()
  const one = (dict: string, data: Uint8Array) => onePage(`${box}/Resources<</XObject<</I 5 0 R>>>>`, draw, [image(dict, data)])
  const plain = rawPdf([
    '<</Type/Catalog/Pages 2 0 R>>', `<</Type/Pages/Count 3/Kids[3 0 R 4 0 R 8 0 R]${box}/Resources 5 0 R>>`, '<</Type/Page/Parent 2 0 R/Contents 6 0 R>>', '<</Type/Pages/Parent 2 0 R/Count 1/Kids[9 0 R]/Rotate 90>>',
    '<</XObject<</I 7 0 R>>>>', { dict: '', data: Buffer.from(draw) }, image(`${grey8}/Filter/DCTDecode`, jpeg), '<</Type/Page/Parent 2 0 R/Contents[6 0 R]>>', '<</Type/Page/Parent 4 0 R/Contents 6 0 R>>',
  ])
  const folder = mkdtempSync(join(tmpdir(), 'small-'))
  const qpdf = (bytes: Buffer, ...options: string[]): Buffer => {
    writeFileSync(join(folder, 'in.pdf'), bytes)
    execFileSync('qpdf', ['--allow-weak-crypto', ...options, join(folder, 'in.pdf'), join(folder, 'out.pdf')])
    return readFileSync(join(folder, 'out.pdf'))
  }
  const made = {
    plain,
    'object streams': qpdf(plain, '--object-streams=generate'),
    linearised: qpdf(plain, '--linearize'),
    rc4: qpdf(plain, '--encrypt', '', 'o', '128', '--'),
    aes: qpdf(plain, '--encrypt', '', 'o', '256', '--', '--object-streams=generate'),
    jbig2: one('/ColorSpace/DeviceGray/BitsPerComponent 1/Filter/JBIG2Decode', jbig2({ width, height, black: (x, y) => grey[y * width + x]! < 100 })),
    flate: one(`${grey8}/Filter/FlateDecode/DecodeParms<</Predictor 15/Columns ${width}>>`, deflateSync(Buffer.concat(Array.from({ length: height }, (_, y) => Buffer.concat([Buffer.from([0]), grey.subarray(y * width, (y + 1) * width)]))))),
    form: onePage(`${box}/Resources<</XObject<</F 5 0 R>>/Pattern<</P 7 0 R>>>>`, '/F Do /Pattern cs /P scn 0 0 9 9 re f', [{ dict: `/Type/XObject/Subtype/Form/BBox[0 0 60 84]/Resources<</XObject<</I 6 0 R>>>>`, data: Buffer.from(draw) }, image(`${grey8}/Filter/DCTDecode`, jpeg), { dict: '/PatternType 1/PaintType 1/TilingType 1/BBox[0 0 5 5]/XStep 5/YStep 5/Resources<<>>', data: Buffer.from('0 0 3 3 re f') }]),
    'inline image': onePage(box, `q 60 0 0 84 0 0 cm BI /W ${width} /H ${height} /CS /G /BPC 8 /F /AHx ID ${grey.subarray(0, 2000).toString('hex')}> EI Q`),
    jpeg,
    png: await sharp(grey, { raw: { width, height, channels: 1 } }).png().toBuffer(),
    tiff: await sharp(grey, { raw: { width, height, channels: 1 } }).tiff({ compression: 'lzw' }).toBuffer(),
    'fax tiff': tiffOf([1, 2].map(() => ({ width: 64, height: 8, strips: [Buffer.from([0x26, 0xa0, 0x10, 0x01])], blackIsZero: false }))),
  }
  rmSync(folder, { recursive: true })
  return made
}
