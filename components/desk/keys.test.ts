import { describe, expect, it } from 'vitest'
import { commandOf, pointKeys, stampKeys } from './keys'

const bare = { shiftKey: false, ctrlKey: false, metaKey: false, altKey: false }
const at = { codeAwaited: false, stampSelected: false }

describe('keys of the desk', () => {
  it('give mark points under the resting hands, part of one with shift', () => {
    expect(commandOf({ ...bare, key: 'a' }, at)).toEqual({ do: 'point', index: 0, part: false })
    expect(commandOf({ ...bare, key: 'S', shiftKey: true }, at)).toEqual({ do: 'point', index: 1, part: true })
    expect(commandOf({ ...bare, key: 'j' }, at)).toEqual({ do: 'point', index: 4, part: false })
  })
  it('mean no two things at once', () => {
    const all = [...pointKeys, ...Object.keys(stampKeys), '0', 'r', 'n', '/', 'p', 'm', 'z']
    expect(new Set(all).size).toBe(all.length)
  })
  it('leave the browser its own', () => {
    expect(commandOf({ ...bare, key: 'a', ctrlKey: true }, at)).toBeNull()
    expect(commandOf({ ...bare, key: 'Tab' }, at)).toBeNull()
    expect(commandOf({ ...bare, key: 'q' }, at)).toBeNull()
  })
  it('take a letter after the stroke as a code, and as itself otherwise', () => {
    expect(commandOf({ ...bare, key: 'f' }, { ...at, codeAwaited: true })).toEqual({ do: 'code', code: 'ft' })
    expect(commandOf({ ...bare, key: 'f' }, at)).toEqual({ do: 'point', index: 3, part: false })
  })
  it('move a selected stamp with the arrows, and the strip when none is', () => {
    expect(commandOf({ ...bare, key: 'ArrowUp' }, { ...at, stampSelected: true })).toEqual({ do: 'nudge', dx: 0, dy: -2 })
    expect(commandOf({ ...bare, key: 'ArrowRight', shiftKey: true }, { ...at, stampSelected: true })).toEqual({ do: 'nudge', dx: 10, dy: 0 })
    expect(commandOf({ ...bare, key: 'ArrowUp' }, at)).toEqual({ do: 'up' })
  })
  it('undo and redo', () => {
    expect(commandOf({ ...bare, key: 'z' }, at)).toEqual({ do: 'undo' })
    expect(commandOf({ ...bare, key: 'Z', shiftKey: true }, at)).toEqual({ do: 'redo' })
  })
})
