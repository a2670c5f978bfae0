/** Says plainly that this is the demo school, so that nobody puts real scripts in it. */
export function DemoBanner() {
  return <aside aria-label="Demo school"><p className="border-b border-rule bg-desk px-6 py-1 text-center text-[length:var(--t-0)] leading-5 text-ink-2">Demo school: everyone and everything here is made up. Do not put real scripts in.</p></aside>
}
