import { headers } from 'next/headers'

/** Where a request of an action came from, for throttling alone. */
export async function callerAddress(): Promise<string> {
  return ((await headers()).get('x-forwarded-for') ?? 'here').split(',')[0]!.trim()
}
