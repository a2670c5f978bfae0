/**
 * Up to so much ink in all its answer spaces, in square millimetres, nothing seems to be written in a response. Only a suggestion: a person looks.
 * Measured on class sets, also with a page found a third of a millimetre off: empty spaces hold at most 1.0 mm² (a hair, print at its
 * edge), a lone digit or tick leaves 2.2 mm² and more. The bench prints both.
 */
export const nothingWritten = 1.6
