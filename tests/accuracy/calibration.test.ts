import { expect, it } from 'vitest'
import { calibrated, derivedThreshold, sayCalibration } from './calibration'

const seen = [{ confidence: 0.05, right: false }, { confidence: 0.31, right: false }, { confidence: 0.35, right: true }, { confidence: 0.62, right: true }, { confidence: 1, right: true }]

it('counts what was right at each tenth of confidence, and believes prints from two tenths above the last mistake', () => {
  const steps = calibrated(seen)
  expect(sayCalibration(steps)).toBe('0.0: 0/1  0.3: 1/2  0.6: 1/1  0.9: 1/1')
  expect(derivedThreshold(steps)).toBeCloseTo(0.6)
  expect(derivedThreshold(calibrated([{ confidence: 0.5, right: true }]))).toBeCloseTo(0.2)
})
