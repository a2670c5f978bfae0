import { deflateSync } from 'node:zlib'
import sharp from 'sharp'
import { onePage, rawPdf, type RawObject } from './raw-pdf'

const box = '/MediaBox[0 0 595 842]'
const whole = 'q 595 0 0 842 0 0 cm /I Do Q'
const oneImage = `${box}/Resources<</XObject<</I 5 0 R>>>>`
const image = (dict: string, data: Uint8Array): RawObject => ({ dict: `/Type/XObject/Subtype/Image ${dict}`, data })
const grey = '/ColorSpace/DeviceGray/BitsPerComponent 8'
const form = (data: string, resources: string): RawObject => ({ dict: `/Type/XObject/Subtype/Form/BBox[0 0 595 842]/Resources<<${resources}>>`, data: Buffer.from(data) })

/** A small JPEG, whole. */
export async function smallJpeg(): Promise<Buffer> {
  return sharp(Buffer.from(Array.from({ length: 400 * 560 }, (_, k) => (k * 7919) % 251)), { raw: { width: 400, height: 560, channels: 1 } }).toColourspace('b-w').jpeg({ quality: 60 }).toBuffer()
}

/** A page with this JPEG, as a sheaf of `pages`; each page's objects are its own. */
export function plainSheaf(jpeg: Buffer, pages: number): Buffer {
  const kids = Array.from({ length: pages }, (_, k) => `${3 + 3 * k} 0 R`).join(' ')
  const objects: RawObject[] = ['<</Type/Catalog/Pages 2 0 R>>', `<</Type/Pages/Count ${pages}/Kids[${kids}]>>`]
  for (let k = 0; k < pages; k++) {
    const n = 3 + 3 * k
    objects.push(`<</Type/Page/Parent 2 0 R/MediaBox[0 0 300 420]/Contents ${n + 1} 0 R/Resources<</XObject<</I ${n + 2} 0 R>>>>>>`, { dict: '', data: Buffer.from('q 300 0 0 420 0 0 cm /I Do Q') }, image(`/Width 400/Height 560 ${grey}/Filter/DCTDecode`, jpeg))
  }
  return rawPdf(objects)
}

/** Pages and files made to exhaust whoever reads them, or to lead them round in circles. */
export async function bombs(): Promise<Readonly<Record<string, Buffer>>> {
  const jpeg = await smallJpeg()
  const huge = Buffer.from(jpeg)
  const frame = huge.indexOf(Buffer.from([0xff, 0xc0]))
  huge.writeUInt16BE(65500, frame + 5)
  huge.writeUInt16BE(65500, frame + 7)
  const jpx = Buffer.alloc(120)
  jpx.writeUInt32BE(0xff4fff51, 20)
  jpx.writeUInt32BE(900_000, 28)
  jpx.writeUInt32BE(900_000, 32)
  const zeros = deflateSync(Buffer.alloc(100 << 20), { level: 9 })
  const forms = Array.from({ length: 30 }, (_, k) => form(k === 29 ? '0 0 9 9 re f' : '/N Do /N Do /N Do', k === 29 ? '' : `/XObject<</N ${k + 6} 0 R>>`))
  const dct = `/Width 400/Height 560 ${grey}/Filter/DCTDecode`
  return {
    'g4 of ten thousand million pixels': onePage(oneImage, whole, [image('/Width 100000/Height 100000/ColorSpace/DeviceGray/BitsPerComponent 1/Filter/CCITTFaxDecode/DecodeParms<</K -1/Columns 100000>>', Buffer.alloc(500, 85))]),
    'bitmap of thousands of million pixels': onePage(oneImage, whole, [image(`/Width 60000/Height 60000 ${grey}/Filter/FlateDecode`, zeros)]),
    'jpeg larger than it says': onePage(oneImage, whole, [image(`/Width 10/Height 10 ${grey}/Filter/DCTDecode`, huge)]),
    'jpeg 2000 larger than it says': onePage(oneImage, whole, [image('/Width 10/Height 10/Filter/JPXDecode', jpx)]),
    'content that swells': rawPdf(['<</Type/Catalog/Pages 2 0 R>>', '<</Type/Pages/Count 1/Kids[3 0 R]>>', `<</Type/Page/Parent 2 0 R/Contents 4 0 R ${box}>>`, { dict: '/Filter/FlateDecode', data: zeros }]),
    'content that swells twice': rawPdf(['<</Type/Catalog/Pages 2 0 R>>', '<</Type/Pages/Count 1/Kids[3 0 R]>>', `<</Type/Page/Parent 2 0 R/Contents 4 0 R ${box}>>`, { dict: '/Filter[/FlateDecode/FlateDecode]', data: deflateSync(zeros) }]),
    'picture that swells twice': onePage(oneImage, whole, [image(`/Width 400/Height 560 ${grey}/Filter[/FlateDecode/FlateDecode/DCTDecode]`, deflateSync(deflateSync(Buffer.alloc(280 << 20), { level: 9 })))]),
    'forms in forms in forms': onePage(`${box}/Resources<</XObject<</N 5 0 R>>>>`, '/N Do', forms),
    'a form inside itself': onePage(`${box}/Resources<</XObject<</N 5 0 R>>>>`, '/N Do', [form('/N Do 0 0 99 99 re f', '/XObject<</N 5 0 R>>')]),
    'a mask that is its own mask': onePage(oneImage, whole, [image(`${dct}/SMask 5 0 R`, jpeg)]),
    'a page as large as a field': onePage(`/MediaBox[0 0 900000 900000]`, '0 0 9 9 re f'),
    'tiles without end': onePage(`${box}/Resources<</Pattern<</P 5 0 R>>>>`, '/Pattern cs /P scn 0 0 595 842 re f', [{ dict: '/Type/Pattern/PatternType 1/PaintType 1/TilingType 1/BBox[0 0 1 1]/XStep 0.001/YStep 0.001/Resources<<>>', data: Buffer.from('0 0 1 1 re f') }]),
    'tiles without a step': onePage(`${box}/Resources<</Pattern<</P 5 0 R>>>>`, '/Pattern cs /P scn 0 0 595 842 re f', [{ dict: '/Type/Pattern/PatternType 1/PaintType 1/TilingType 1/BBox[0 0 5 5]/YStep 5/Resources<<>>', data: Buffer.from('0 0 1 1 re f') }]),
    'resources in a circle': onePage(`${box}/Resources 5 0 R`, '/I Do', ['<</XObject 6 0 R>>', '<</I 5 0 R/J 6 0 R>>']),
    'a length that is itself': rawPdf(['<</Type/Catalog/Pages 2 0 R>>', '<</Type/Pages/Count 1/Kids[3 0 R]>>', `<</Type/Page/Parent 2 0 R/Contents 4 0 R ${box}>>`, '<</Length 4 0 R>>\nstream\n0 0 9 9 re f\nendstream']),
    'a tree in a circle': rawPdf(['<</Type/Catalog/Pages 2 0 R>>', '<</Type/Pages/Count 9/Kids[2 0 R 3 0 R 2 0 R]>>', `<</Type/Pages/Kids[2 0 R 4 0 R 3 0 R]>>`, `<</Type/Page/Parent 2 0 R ${box}>>`]),
    'a tree that doubles': rawPdf(['<</Type/Catalog/Pages 2 0 R>>', ...Array.from({ length: 40 }, (_, k) => `<</Type/Pages/Kids[${k + 3} 0 R ${k + 3} 0 R]>>`), `<</Type/Page ${box}>>`]),
    'a million brackets': onePage(`${box}/Resources ${'['.repeat(1_000_000)}`, '0 0 9 9 re f'),
    'a string without end': onePage(`${box}/Title(${'x'.repeat(3_000_000)}`, '0 0 9 9 re f'),
    'a million saved states': onePage(box, 'q '.repeat(1_000_000)),
    'a function in a circle': onePage(`${box}/Resources<</Shading<</S<</ShadingType 1/ColorSpace/DeviceGray/Function 5 0 R>>>>>>`, '/S sh', ['<</FunctionType 3/Domain[0 1]/Functions[5 0 R 5 0 R]/Bounds[0.5]/Encode[0 1 0 1]>>']),
    'one dot for a page': onePage(oneImage, whole, [image(`/Width 1/Height 1 ${grey}`, Buffer.from([120]))]),
    'a picture of one line': onePage(oneImage, whole, [image(`/Width 30000/Height 1 ${grey}`, Buffer.alloc(30_000, 90))]),
    'jbig2 of noise': onePage(oneImage, whole, [image('/Width 400/Height 560/ColorSpace/DeviceGray/BitsPerComponent 1/Filter/JBIG2Decode', Buffer.from(Array.from({ length: 5000 }, (_, k) => (k * 7919) & 255)))]),
    'a script, a file and a note': rawPdf(['<</Type/Catalog/Pages 2 0 R/OpenAction 6 0 R/Names<</EmbeddedFiles<</Names[(a) 7 0 R]>>/JavaScript<</Names[(b) 6 0 R]>>>>>>', '<</Type/Pages/Count 1/Kids[3 0 R]>>', `<</Type/Page/Parent 2 0 R/Contents 4 0 R ${oneImage}/AA<</O 6 0 R>>/Annots[8 0 R]>>`, { dict: '', data: Buffer.from(whole) }, image(dct, jpeg), '<</S/JavaScript/JS(while\\(true\\){})>>', { dict: '/Type/EmbeddedFile', data: Buffer.alloc(1000) }, '<</Type/Annot/Subtype/Link/Rect[0 0 9 9]/A 6 0 R>>']),
  }
}
