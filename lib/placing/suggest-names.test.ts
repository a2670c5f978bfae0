import { describe, expect, it } from 'vitest'
import { suggestNames } from './suggest-names'

const list = ['Abdi', 'Banerjee', 'Conti', 'Demir', 'Eze', 'Farouk']
const pile = (...students: (string | null)[]) => students.map((student, k) => ({ id: `s${k}`, student }))
const said = (...students: (string | null)[]) => [...suggestNames(pile(...students), list).values()]

describe('suggesting names by the order of the list', () => {
  it('follows the list when the pile may lie in its order', () => {
    expect(said(null, null, null, null, null)).toEqual(['Abdi', 'Banerjee', 'Conti', 'Demir', 'Eze'])
  })

  it('shifts what follows once a name shows that someone is missing', () => {
    expect(said('Abdi', 'Conti', null, null)).toEqual(['Demir', 'Eze'])
  })

  it('starts again after each confirmed neighbour', () => {
    expect(said(null, 'Demir', null)).toEqual(['Abdi', 'Eze'])
  })

  it('never suggests a student twice, nor one whose script is named', () => {
    const names = said('Banerjee', null, 'Conti', null)
    expect(names).toEqual([null, 'Demir'])
  })

  it('says nothing between neighbours that lie the other way round', () => {
    expect(said('Eze', null, 'Banerjee', null)).toEqual([null, 'Conti'])
  })

  it('says nothing for a pile larger than the list, or for a few sheets of it', () => {
    expect(said(null, null, null, null, null, null, null)).toEqual(Array(7).fill(null))
    expect(said(null, null)).toEqual([null, null])
  })
})
