import { Fragment } from 'react'
import { sayTime } from '@/components/ui/say-time'

type Mail = Readonly<{ key: string; at: number; to: string; subject: string; text: string }>

/** The mails as their readers would have them, newest first. Links of this school can be pressed; others are only shown. */
export function ReceivedMails({ mails, home }: { mails: readonly Mail[]; home: string }) {
  if (mails.length === 0) return <p className="slip">No mail yet. Invitations, new passwords and handed-back scripts will stand here.</p>
  return (
    <ol className="m-0 list-none p-0">
      {mails.map((mail) => (
        <li key={mail.key} className="grid grid-cols-[9rem_minmax(0,1fr)] gap-x-4 border-t border-rule py-4 max-sm:grid-cols-1">
          <p className="soft dense"><time dateTime={new Date(mail.at).toISOString()}>{sayTime(mail.at)}</time></p>
          <article>
            <h3>{mail.subject}</h3>
            <p className="soft dense mb-3 break-all">to {mail.to}</p>
            <p className="max-w-[40rem] break-words whitespace-pre-line"><Linked text={mail.text.trim()} home={home} /></p>
          </article>
        </li>
      ))}
    </ol>
  )
}

function Linked({ text, home }: { text: string; home: string }) {
  return text.split(/(https?:\/\/\S+)/).map((part, k) => {
    const path = pathHere(part, home)
    return <Fragment key={k}>{path ? <a className="break-all" href={path}>{part}</a> : part}</Fragment>
  })
}

/** A link of this school opens at whatever address the reader is at now, also when it was written while another was in use. */
function pathHere(part: string, home: string): string | null {
  const url = part.startsWith('http') && URL.canParse(part) ? new URL(part) : null
  if (!url || (url.origin !== new URL(home).origin && url.hostname !== 'localhost')) return null
  return `${url.pathname}${url.search}`
}
