import Link from 'next/link'

export default function NotFound() {
  return (
    <main className="page"><div className="slip mx-auto mt-[14vh]">
      <h1>Nothing here</h1>
      <p className="mt-2 mb-4">This page is not here, or not for you.</p>
      <Link className="btn" href="/">To your papers</Link>
    </div></main>
  )
}
