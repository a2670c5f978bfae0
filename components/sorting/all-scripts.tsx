import type { SortScript, SortingTable } from '@/lib/core/sorting'
import { scriptNotes } from './reason-words'
import { whose } from './sorting-words'
import style from './sorting.module.css'

type AllScriptsProps = Readonly<{ table: SortingTable; busy: boolean; onLook: (leafId: string, script: SortScript) => void; onOther: (script: SortScript) => void; onUnname: (script: SortScript) => void }>

/** Every script with its pages: a page can be looked at and taken out, a name changed. */
export function AllScripts({ table, busy, onLook, onOther, onUnname }: AllScriptsProps) {
  if (table.scripts.length === 0) return null
  const lacking = table.scripts.filter(({ missing }) => missing.length > 0).length
  return (
    <details className={style.fold}>
      <summary>All scripts <small>{table.scripts.length}{lacking > 0 ? `, ${lacking} with a page missing` : ''}</small></summary>
      <table className={style.names}>
        <tbody>
          {table.scripts.map((script) => {
            const known = whose(script, table)
            const notes = scriptNotes(script)
            return (
              <tr key={script.id}>
                <td>{script.number}</td>
                <td>{script.studentId ? <><b>{known.name}</b> {known.number}</> : <span className="soft">{known.number ? `perhaps ${known.name}` : 'no name yet'}</span>}{notes.length > 0 && <span className={style.why}>{notes.join('; ')}</span>}</td>
                <td><span className={style.attend}>{script.pages.map((page, k) => page.leafId && <button key={page.id} type="button" className={style.act} onClick={() => onLook(page.leafId!, script)} aria-label={`Look at ${page.paperPage ? `page ${page.paperPage}` : 'the extra page'} of script ${script.number}`}>{page.paperPage ? `page ${page.paperPage}` : `extra ${k + 1 - script.pages.filter(({ paperPage }) => paperPage !== null).length}`}</button>)}</span></td>
                <td className={style.go}>{script.studentId && <span className={style.attend}><button type="button" className={style.act} disabled={busy} onClick={() => onOther(script)}>other name</button> <button type="button" className={style.act} disabled={busy} onClick={() => onUnname(script)}>no name</button></span>}</td>
              </tr>
            )
          })}
        </tbody>
      </table>
    </details>
  )
}
