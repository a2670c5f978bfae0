/** Says plainly that this is the demo school, so that nobody puts real scripts in it. It lies in the top bar where there is room. */
export function DemoBanner() {
  return <aside aria-label="Demo school" className="demo-banner">Demo school: everyone here is made up. <span>Do not put real scripts in.</span></aside>
}
