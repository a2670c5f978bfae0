/** How many scripts of a cohort are second-marked when the school sets no number (check-values: sample-size-2026). */
export function defaultSampleSize(cohort: number): number {
  if (cohort <= 15) return cohort
  if (cohort <= 100) return 15
  return cohort <= 200 ? 20 : 25
}
