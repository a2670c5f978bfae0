import { PDFDocument } from 'pdf-lib'
import sharp from 'sharp'
import type { Homography } from '@/lib/core/paper-space'
import type { Db } from '@/db/knex'
import { listScriptPages } from '@/db/runs'
import { pageToReturn } from '@/lib/handing-back/page-marks'
import type { ScriptPage } from '@/lib/handing-back/returned-page'
import { loadSheaf } from '@/lib/handing-back/returned-script'
import type { GatheredScript } from '@/lib/handing-back/script-to-return'
import { drawCut } from './draw-cut'
import { cutOf, masksOf, wholePage } from './pictures-of-script'

const dpi = 200

/**
 * The pages of a script as pictures of the paper with name and number boxes painted over, as a sheaf of their own named `covered`, for
 * who may see the writing and not whose it is. A page whose place on the paper is not known may show a name anywhere and is left out.
 */
export async function coverNames(db: Db, scriptId: string, script: GatheredScript): Promise<{ pages: ScriptPage[]; sheaf: PDFDocument }> {
  const sheaf = await PDFDocument.create({ updateMetadata: false })
  const pages: ScriptPage[] = []
  const all = await listScriptPages(db, scriptId)
  for (const [k, page] of script.pages.entries()) {
    const own = all.find(({ id }) => id === page.id)
    const rect = own && page.paperPage !== null ? wholePage(own, script.paper) : null
    const cut = own && rect && cutOf(own, rect, masksOf(script.paper, page.paperPage))
    if (!cut) continue
    const { data, info } = await sharp((await drawCut(db, cut, dpi)).bytes).jpeg({ quality: 85 }).toBuffer({ resolveWithObject: true })
    const sheet = sheaf.addPage([cut.rect.w, cut.rect.h])
    sheet.drawImage(await sheaf.embedJpg(data), { x: 0, y: 0, width: cut.rect.w, height: cut.rect.h })
    const homography: Homography = [[info.width / cut.rect.w, 0, 0], [0, info.height / cut.rect.h, 0], [0, 0, 1]]
    const leaf = { sheafId: 'covered', position: pages.length, half: null, width: info.width, height: info.height, homography }
    pages.push(pageToReturn(script, { ...page, leaf }, k + 1, false))
  }
  return { pages, sheaf: await loadSheaf(await sheaf.save()) }
}
