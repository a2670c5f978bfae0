import type { ReactNode } from 'react'

/** The label on the cover: the frame of every page before the school's door. */
export function CoverLabel({ school, under, children }: { school: string; under?: string; children: ReactNode }) {
  return (
    <main className="grid min-h-screen place-items-center bg-desk p-4">
      <div className="w-[27rem] max-w-full">
        <div className="rounded-[2px] border border-rule-2 bg-paper p-[5px]">
          <div className="border border-rule-2 px-9 pt-8 pb-7 max-sm:px-5">
            <img className="mx-auto mb-2 block h-13 w-13" src="/logo.svg" alt="" />
            <h1 className="text-center">Sheafmark</h1>
            <p className="soft mb-5 text-center">{school}</p>
            {children}
          </div>
        </div>
        {under && <p className="soft pt-3 text-center text-[length:var(--t-0)] leading-5 text-balance">{under}</p>}
      </div>
    </main>
  )
}
