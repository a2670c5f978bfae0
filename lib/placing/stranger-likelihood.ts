import { numberLikelihood, type BoxLikelihoods } from './number-likelihood'

/** Most strangers bear a number from among the list's: they left the class or came late. The rest may bear any. */
const near = 0.9
/** Numbers are tried one by one only as far as this. */
const mostTried = 20_000

/** How well boxes agree with the number of somebody who is not on the list (natural logarithm). */
export type StrangerLikelihood = (boxes: BoxLikelihoods) => number

/**
 * Makes the measure for one list. The numbers that are missing between its lowest and its highest, and a little beyond, are the
 * likeliest; those the list has are nobody else's.
 */
export function strangerLikelihood(numbers: readonly string[]): StrangerLikelihood {
  const missing = missingFrom(numbers)
  return (boxes) => {
    const anywhere = (1 - near) / 10 ** boxes.length
    if (missing.length === 0) return Math.log(anywhere + near / mostTried)
    let sum = 0
    for (const number of missing) sum += Math.exp(numberLikelihood(boxes, number))
    return Math.log(anywhere + (near * sum) / missing.length)
  }
}

function missingFrom(numbers: readonly string[]): string[] {
  const own = new Set(numbers)
  const plain = numbers.filter((number) => /^\d{1,9}$/.test(number))
  const length = Math.max(0, ...plain.map((number) => number.length))
  const values = plain.map(Number)
  const [lowest, highest] = [Math.min(...values), Math.max(...values)]
  const beyond = 3 + Math.ceil((highest - lowest) / 20)
  if (plain.length === 0 || highest - lowest > mostTried) return []
  return Array.from({ length: highest - lowest + 1 + 2 * beyond }, (_, k) => lowest - beyond + k)
    .filter((value) => value >= 0).map((value) => String(value).padStart(length, '0')).filter((number) => number.length === length && !own.has(number))
}
