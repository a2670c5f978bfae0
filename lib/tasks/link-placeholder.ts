import { tokenOfLink } from '@/lib/infra/link-token'

const pattern = /one-time-link-([0-9a-f-]{36})/g

/** Stands in a waiting mail where the token goes, so that the outbox holds no token. */
export function linkPlaceholder(linkId: string): string {
  return `one-time-link-${linkId}`
}

/** The mail as it leaves: each placeholder becomes its token. */
export function withTokens(text: string): string {
  return text.replace(pattern, (_, linkId: string) => tokenOfLink(linkId))
}
