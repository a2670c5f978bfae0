import { sayTime } from '@/components/ui/say-time'
import type { Outcome } from '@/lib/core/outcome'
import { RetryButton } from './retry-button'

type MailLine = Readonly<{
  id: string
  to: string
  subject: string
  state: 'waiting' | 'sending' | 'sent' | 'failed'
  attempts: number
  sendAfter: number
  sentAt: number | null
  error: string | null
}>
type MailLinesProps = Readonly<{ lines: readonly MailLine[]; retry?: (id: string) => Promise<Outcome<void>> }>

/** Mails by their state, without their words. */
export function MailLines({ lines, retry }: MailLinesProps) {
  return (
    <div className="overflow-x-auto" tabIndex={0} role="region" aria-label="Mails by state">
      <table className="tbl">
        <thead>
          <tr>
            <th>To</th>
            <th>Subject</th>
            <th>State</th>
            <th>
              <span className="vh">What can be done</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {lines.map((mail) => (
            <tr key={mail.id}>
              <td>{mail.to}</td>
              <td>{mail.subject}</td>
              <td>{stateOf(mail)}</td>
              <td className="pr-0 text-right whitespace-nowrap">
                {retry && mail.state === 'failed' && <RetryButton to={mail.to} retry={retry.bind(null, mail.id)} />}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  )
}

function stateOf(mail: MailLine): string {
  if (mail.state === 'sent' && mail.sentAt !== null) return `sent ${sayTime(mail.sentAt)}`
  if (mail.state === 'failed') return `given up after ${mail.attempts} ${mail.attempts === 1 ? 'try' : 'tries'}: ${mail.error ?? ''}`
  if (mail.state === 'waiting' && mail.attempts > 0) return `${mail.error ?? 'no answer'}; next try ${sayTime(mail.sendAfter)}`
  return mail.state === 'sending' ? 'being sent' : 'waiting'
}
