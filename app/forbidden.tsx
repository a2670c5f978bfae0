import Link from 'next/link'

export default function Forbidden() {
  return (
    <main className="page"><div className="slip mx-auto mt-[14vh]">
      <h1>Not yours to open</h1>
      <p className="mt-2 mb-4">Your account may not do this here. Ask the paper’s owner or the school’s admin.</p>
      <Link className="btn" href="/">To your papers</Link>
    </div></main>
  )
}
