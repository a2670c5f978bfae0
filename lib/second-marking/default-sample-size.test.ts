import { describe, expect, it } from 'vitest'
import { checkValue } from '@/tests/make/check-value'
import { defaultSampleSize } from './default-sample-size'

describe('the size of a sample (check-values: sample-size-2026)', () => {
  const { data, expected } = checkValue<{ cohort: number[] }, { sample: number[] }>('sample-size-2026')
  it('follows the published table', () => {
    expect(data.cohort.map(defaultSampleSize)).toEqual(expected.sample)
  })
})
