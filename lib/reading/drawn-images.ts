import { chain, identity, type Affine } from './affine'
import { contentTokens, type ContentToken } from './content-tokens'

/** What a page's content draws: XObjects by name with the matrix of their unit square, and whether anything else leaves ink. */
export type DrawnImages = Readonly<{ drawn: readonly Readonly<{ name: string; matrix: Affine }>[]; otherInk: boolean; coloured: boolean }>

const mostOperands = 600
const deepest = 10_000
const painting = new Set(['f', 'F', 'f*', 'S', 's', 'B', 'B*', 'b', 'b*', 'sh', 'BI', 'Tj', 'TJ', "'", '"'])
const text = new Set(['Tj', 'TJ', "'", '"'])
const colours = new Set(['g', 'rg', 'k', 'sc', 'scn', 'cs', 'gs'])

/** Follows q, Q, cm and Do, up to the second image or other ink. Invisible text (rendering mode 3, as text recognition leaves it) is no ink; clips are. */
export function drawnImages(content: Uint8Array): DrawnImages {
  const drawn: { name: string; matrix: Affine }[] = []
  const kept: { matrix: Affine; mode: number }[] = []
  let state = { matrix: identity, mode: 0 }
  let otherInk = false
  let coloured = false
  let operands: ContentToken[] = []
  for (const token of contentTokens(content)) {
    if (token.kind !== 'operator') {
      if (operands.length > mostOperands) operands = operands.slice(-6)
      operands.push(token)
      continue
    }
    const op = token.value
    if (drawn.length > 1 || otherInk) break
    if (op === 'q' && kept.length < deepest) kept.push(state)
    else if (op === 'Q') state = kept.pop() ?? state
    else if (op === 'cm') state = { ...state, matrix: chain(matrixOf(operands), state.matrix) }
    else if (op === 'Tr') state = { ...state, mode: numberOf(operands.at(-1)) }
    else if (op === 'Do') drawn.push({ name: nameOf(operands.at(-1)), matrix: state.matrix })
    else if (colours.has(op)) coloured = true
    else if (painting.has(op) && !(text.has(op) && state.mode === 3)) otherInk = true
    operands = []
  }
  return { drawn, otherInk, coloured }
}

function matrixOf(operands: readonly ContentToken[]): Affine {
  const six = operands.slice(-6).map(numberOf)
  return six.length === 6 ? (six as unknown as Affine) : identity
}
function numberOf(token: ContentToken | undefined): number {
  return token?.kind === 'number' ? token.value : 0
}
function nameOf(token: ContentToken | undefined): string {
  return token?.kind === 'name' ? token.value : ''
}
