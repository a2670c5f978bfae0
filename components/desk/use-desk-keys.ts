'use client'
import { useEffect } from 'react'
import { commandOf, type Command } from './keys'

type Standing = Parameters<typeof commandOf>[1]

/** Keys of the desk, wherever the focus is, except while something is written or a button is pressed by its own keys. */
export function useDeskKeys(standing: Standing, onCommand: (command: Command) => void): void {
  useEffect(() => {
    const pressed = (event: KeyboardEvent): void => {
      const target = event.target instanceof Element ? event.target : null
      if (event.defaultPrevented || event.isComposing || target?.closest('input, textarea, select, [contenteditable], [role="menu"], [role="dialog"]')) return
      if ((event.key === 'Enter' || event.key === ' ') && target?.closest('button, a')) return
      const command = commandOf(event, standing)
      if (!command || (event.repeat && !['nudge', 'up', 'down'].includes(command.do))) return
      event.preventDefault()
      onCommand(command)
    }
    window.addEventListener('keydown', pressed)
    return () => window.removeEventListener('keydown', pressed)
  }, [standing, onCommand])
}
