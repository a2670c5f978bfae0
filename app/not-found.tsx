import Link from 'next/link'

export default function NotFound() {
  return <main className="page"><h1>Nothing here</h1><p className="my-3">This page is not here, or not for you.</p><Link className="btn" href="/">To your papers</Link></main>
}
