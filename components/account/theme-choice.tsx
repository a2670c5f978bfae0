'use client'
import { useSyncExternalStore } from 'react'

const key = 'sheafmark-theme'
const choices = [['', 'as this machine'], ['light', 'light'], ['dark', 'dark']] as const

function subscribe(changed: () => void) {
  window.addEventListener('storage', changed)
  return () => window.removeEventListener('storage', changed)
}

/** Light or dark, kept in this browser. Dark dims the desk, never the script. */
export function ThemeChoice() {
  const chosen = useSyncExternalStore(subscribe, () => localStorage.getItem(key) ?? '', () => '')
  function choose(next: string) {
    if (next === '') localStorage.removeItem(key)
    else localStorage.setItem(key, next)
    document.documentElement.setAttribute('data-theme', next || (matchMedia('(prefers-color-scheme: dark)').matches ? 'dark' : 'light'))
    // Other tabs hear of it by themselves; this one is told.
    window.dispatchEvent(new StorageEvent('storage', { key }))
  }
  return (
    <fieldset className="m-0 flex flex-wrap gap-x-6 gap-y-2 border-0 p-0">
      <legend className="vh">Light or dark</legend>
      {choices.map(([value, says]) => (
        <label key={value} className="chk"><input type="radio" name="theme" checked={chosen === value} onChange={() => choose(value)} /> {says}</label>
      ))}
    </fieldset>
  )
}
