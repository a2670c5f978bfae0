import { PDFDict, PDFName, PDFString, type PDFDocument, type PDFPage, type PDFRef } from 'pdf-lib'
import { textString } from '@/lib/typesetting/operators'

/** The kinds of structure a returned script has (ISO 32000-1, 14.8.4). */
export type Tag = 'H1' | 'H2' | 'P' | 'L' | 'LI' | 'Table' | 'TR' | 'TH' | 'TD' | 'Figure'
export type Branch = { tag: Tag | 'Document'; children: (Branch | Leaf)[]; alt: string | null }
type Leaf = Readonly<{ page: PDFPage; id: number }>

/**
 * The reading order of a file for screen readers: elements hold marked pieces of page content. Pieces are written in reading order, so
 * the tree grows as the page is drawn.
 */
export class Structure {
  private readonly open: Branch[] = [{ tag: 'Document', children: [], alt: null }]
  private readonly counts = new Map<PDFPage, number>()

  /** An element round what `draw` writes. */
  within<T>(tag: Tag, draw: () => T, alt: string | null = null): T {
    const branch = this.element(tag, alt)
    return this.inside(branch, draw)
  }

  /** A new, empty element of the open one, to be filled piece by piece. */
  element(tag: Tag, alt: string | null = null): Branch {
    const branch: Branch = { tag, children: [], alt }
    this.open.at(-1)!.children.push(branch)
    return branch
  }

  /** Puts what `draw` writes into an element. */
  inside<T>(branch: Branch, draw: () => T): T {
    this.open.push(branch)
    try {
      return draw()
    } finally {
      this.open.pop()
    }
  }

  /** Marks operators as a piece of the innermost open element. */
  piece(page: PDFPage, operators: string): string {
    return `${this.opening(page)}\n${operators}\nEMC`
  }

  /** What begins a piece of the innermost open element; EMC ends it. */
  opening(page: PDFPage): string {
    const id = this.counts.get(page) ?? 0
    this.counts.set(page, id + 1)
    const branch = this.open.at(-1)!
    branch.children.push({ page, id })
    return `/${branch.tag} <</MCID ${id}>> BDC`
  }

  /** Rules and other things that say nothing. */
  static decoration(operators: string): string {
    return `/Artifact BMC\n${operators}\nEMC`
  }

  /** Writes the tree into the file's catalog. */
  store(pdf: PDFDocument): void {
    const { context } = pdf
    const root = context.nextRef()
    const owners = new Map<PDFPage, PDFRef[]>()
    const top = this.write(pdf, this.open[0]!, root, owners)
    const numbers = [...owners].flatMap(([page, refs], k) => {
      page.node.set(PDFName.of('StructParents'), context.obj(k))
      return [context.obj(k), context.obj(refs)]
    })
    context.assign(root, context.obj({ Type: 'StructTreeRoot', K: top, ParentTree: { Nums: numbers }, ParentTreeNextKey: owners.size }))
    pdf.catalog.set(PDFName.of('StructTreeRoot'), root)
    pdf.catalog.set(PDFName.of('MarkInfo'), context.obj({ Marked: true }))
  }

  private write(pdf: PDFDocument, branch: Branch, parent: PDFRef, owners: Map<PDFPage, PDFRef[]>): PDFRef {
    const { context } = pdf
    const ref = context.nextRef()
    const page = branch.children.flatMap((child) => ('page' in child ? [child.page] : []))[0]
    const kids = branch.children.map((child) => {
      if (!('page' in child)) return this.write(pdf, child, ref, owners)
      const refs = owners.get(child.page) ?? []
      refs[child.id] = ref
      owners.set(child.page, refs)
      return child.page === page ? context.obj(child.id) : context.obj({ Type: 'MCR', Pg: child.page.ref, MCID: child.id })
    })
    const dict: PDFDict = context.obj({ S: branch.tag, P: parent, K: kids.length === 1 ? kids[0]! : kids })
    if (page) dict.set(PDFName.of('Pg'), page.ref)
    if (branch.alt !== null) dict.set(PDFName.of('Alt'), textString(branch.alt))
    if (branch.tag === 'Document') dict.set(PDFName.of('Lang'), PDFString.of('en-GB'))
    if (branch.tag === 'TH') dict.set(PDFName.of('A'), context.obj({ O: 'Table', Scope: 'Column' }))
    context.assign(ref, dict)
    return ref
  }
}
