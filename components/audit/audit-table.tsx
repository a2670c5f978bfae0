import { sayTime } from '@/components/ui/say-time'

type AuditLine = Readonly<{ id: number; at: number; actorId: string | null; act: string; objectKind: string; objectId: string; paperId: string | null; from: string | null; to: string | null }>

/** Ids are cut to their first eight signs on the screen and whole under the pointer. */
export function AuditTable({ lines }: { lines: readonly AuditLine[] }) {
  return (
    <div className="overflow-x-auto" tabIndex={0} role="region" aria-label="Audit lines">
      <table className="tbl">
        <thead><tr><th className="num">Line</th><th className="pl-4">When</th><th>Who</th><th>Did</th><th>To what</th><th>On paper</th><th>From</th><th>To</th></tr></thead>
        <tbody>
          {lines.map((line) => (
            <tr key={line.id}>
              <td className="num">{line.id}</td>
              <td className="pl-4 whitespace-nowrap">{sayTime(line.at)}</td>
              <td>{line.actorId === null ? 'the machine' : <ShortId id={line.actorId} />}</td>
              <td className="whitespace-nowrap">{line.act}</td>
              <td className="whitespace-nowrap">{line.objectKind} <ShortId id={line.objectId} /></td>
              <td>{line.paperId && <ShortId id={line.paperId} />}</td>
              <td className="break-words">{line.from && <Value text={line.from} />}</td>
              <td className="break-words">{line.to && <Value text={line.to} />}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  )
}

function ShortId({ id }: { id: string }) {
  return <span className="soft" title={id}>{id.length > 12 ? id.slice(0, 8) : id}</span>
}

/** A value; ids within it are cut too. */
function Value({ text }: { text: string }) {
  return <span title={text}>{text.replace(/\b([0-9a-f]{8})-[0-9a-f-]{27}\b/g, '$1')}</span>
}
