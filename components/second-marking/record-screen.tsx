import Link from 'next/link'
import type { ModerationRecord, RecordTable } from '@/lib/core/moderation-record'
import styles from './figures.module.css'

function Table({ table: { heads, rows, figures }, name }: { table: RecordTable; name: string }) {
  return (
    <div className={styles.wide} tabIndex={0} role="group" aria-label={name}>
      <table className={`tbl ${figures ? styles.figures : ''}`}>
        <thead><tr>{heads.map((head) => <th key={head} scope="col">{head}</th>)}</tr></thead>
        <tbody>{rows.map(([first, ...rest], k) => <tr key={k}><th scope="row">{first}</th>{rest.map((cell, n) => <td key={n}>{cell}</td>)}</tr>)}</tbody>
      </table>
    </div>
  )
}

/** The record of a moderation on a page, with the way to its file. */
export function RecordScreen({ paperId, sampleId, record: { title, where, asOf, sections } }: Readonly<{ paperId: string; sampleId: string; record: ModerationRecord }>) {
  return (
    <main className="page">
      <h1>{title}</h1>
      <p className="soft">{where}. As it stood on {asOf}.</p>
      <p className="mt-3 flex flex-wrap gap-3"><a className="btn" href={`/api/samples/${sampleId}/record`} download>Save as PDF</a><Link className="btn plain" href={`/papers/${paperId}/second-mark`}>Back to second marking</Link></p>
      {sections.map(({ heading, lines, table }) => (
        <section key={heading} className={styles.panel}>
          <h2 className="cap">{heading}</h2>
          {lines.map((line) => <p key={line} className="dense mt-1 max-w-[46rem]">{line}</p>)}
          {table && table.rows.length > 0 && <Table table={table} name={heading} />}
        </section>
      ))}
    </main>
  )
}
