import type { GreyPicture } from '@/lib/core/grey-picture'

/** A decoder fills what is missing of a JPEG with the middle grey. */
const middle = [126, 130] as const
const rows = 4

/** Whether a picture's last rows are nothing but middle grey, as where its stream broke off: paper never is. */
export function endsInGrey({ width, height, data }: GreyPicture): boolean {
  const tail = data.subarray(Math.max(0, height - rows) * width)
  return tail.every((v) => v >= middle[0] && v <= middle[1])
}
