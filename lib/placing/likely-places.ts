import type { LikelyPlace, PlaceTarget } from '@/lib/core/sorting'

/** A script as it lies in the pile: for each of its pages the position of its leaf in this sheaf, null in another. */
export type PiledScript = Readonly<{ id: string; pages: readonly Readonly<{ paperPage: number | null; position: number | null }>[] }>
export type LooseInPile = Readonly<{ position: number; paperPage: number | null; secondScan: boolean }>

/** So many places have a key of their own. */
export const mostPlaces = 3

/**
 * The two or three likeliest places of a loose sheet, best first: scripts near it in the pile that lack its page, then
 * students without a script. A second scan belongs where the first one lies. Nearness only; a person looks and decides.
 */
export function likelyPlaces(leaf: LooseInPile, scripts: readonly PiledScript[], without: readonly PlaceTarget[]): LikelyPlace[] {
  const near = scripts.flatMap((script) => nearness(leaf, script) ?? []).sort((a, b) => a.weight - b.weight)
  const places: LikelyPlace[] = near.map(({ place }) => place)
  const starts = leaf.paperPage === null || leaf.paperPage === 1
  const fresh: LikelyPlace[] = without.map((target) => ({ target, reason: 'no_script', apart: 0 }))
  return (starts && !leaf.secondScan ? [...places.slice(0, 2), ...fresh, ...places.slice(2)] : [...places, ...fresh]).slice(0, mostPlaces)
}

/** Where a leaf of a later sheaf may go: of its candidates those that still lack its page, or still have it when it looks like a new scan of it. */
export function latePlaces(candidates: readonly string[], paperPage: number | null, again: boolean, scripts: readonly Readonly<{ id: string; pages: readonly Readonly<{ paperPage: number | null; leafId: string | null }>[] }>[]): LikelyPlace[] {
  const has = (id: string): boolean | null => scripts.find((script) => script.id === id)?.pages.some((page) => page.paperPage === paperPage && page.leafId !== null) ?? null
  return candidates.filter((id) => has(id) === again).slice(0, mostPlaces).map((scriptId) => ({ target: { scriptId }, reason: again ? 'looks_same' : 'lacks_page', apart: 0 }))
}

function nearness(leaf: LooseInPile, { id, pages }: PiledScript): { place: LikelyPlace; weight: number } | null {
  const has = leaf.paperPage !== null && pages.some((page) => page.paperPage === leaf.paperPage)
  if (has !== (leaf.secondScan && has)) return null
  const steps = pages.flatMap(({ position }) => (position === null ? [] : leaf.position - position))
  const apart = Math.min(...steps.map(Math.abs))
  if (!Number.isFinite(apart) || apart === 0) return null
  const follows = steps.some((step) => step === apart)
  const place: LikelyPlace = { target: { scriptId: id }, reason: has ? 'second_scan' : follows ? 'follows' : 'precedes', apart }
  // What lies before a sheet says more than what comes after; a second scan most of all.
  return { place, weight: apart + (follows ? 0 : 0.5) - (has ? 0.75 : 0) }
}
