'use client'
import { useEffect } from 'react'

export type SetKeys = Readonly<{
  newSpace: () => void; copy: () => void; undo: () => void; redo: () => void; drop: () => void; leave: () => void; scheme: () => void
  nudge: (dx: number, dy: number, size: boolean) => void; zoom: (by: 1 | -1 | 0) => void
}>

/** In points: one press of an arrow key. */
const step = 2
const arrows: Record<string, readonly [number, number]> = { ArrowLeft: [-step, 0], ArrowRight: [step, 0], ArrowUp: [0, -step], ArrowDown: [0, step] }

/** Keys of the page: they work while the page or nothing has the focus, never while someone writes. */
export function useSetKeys(keys: SetKeys): void {
  useEffect(() => {
    function onKey(event: KeyboardEvent) {
      const target = event.target as HTMLElement
      const onSpace = target.id.startsWith('space-')
      if (target !== document.body && !target.closest('[data-page-desk]')) return
      if (event.key.toLowerCase() === 'z' && !event.altKey) return done(event, event.shiftKey ? keys.redo : keys.undo)
      if (event.ctrlKey || event.metaKey || event.altKey) return
      const arrow = arrows[event.key]
      if (arrow && onSpace) return done(event, () => keys.nudge(arrow[0], arrow[1], event.shiftKey))
      if (onSpace && event.key === 'Enter') return done(event, keys.scheme)
      if (onSpace && (event.key === 'Delete' || event.key === 'Backspace')) return done(event, keys.drop)
      const others: Record<string, () => void> = { q: keys.newSpace, c: keys.copy, escape: keys.leave, '+': () => keys.zoom(1), '=': () => keys.zoom(1), '-': () => keys.zoom(-1), '0': () => keys.zoom(0) }
      const act = others[event.key.toLowerCase()]
      if (act) done(event, act)
    }
    window.addEventListener('keydown', onKey)
    return () => window.removeEventListener('keydown', onKey)
  }, [keys])
}

function done(event: KeyboardEvent, act: () => void) {
  event.preventDefault()
  act()
}
