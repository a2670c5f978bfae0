import { forbidden, notFound, redirect } from 'next/navigation'
import { expected } from '@/lib/infra/outcome'

/** What a page reads: a refusal becomes the not-found, the not-allowed or the sign-in page; a bug the error screen. */
export async function pageOf<T>(work: Promise<T>): Promise<T> {
  try {
    return await work
  } catch (error) {
    const known = expected(error)
    if (known?.code === 'not_found' || known?.code === 'not_released') notFound()
    if (known?.code === 'not_allowed') forbidden()
    if (known?.code === 'signed_out') redirect('/sign-in')
    throw error
  }
}
