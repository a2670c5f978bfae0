/**
 * Up to so much ink in all its answer spaces, in square millimetres, nothing seems to be written in a response. Only a suggestion: a person looks. Dust and
 * what shines through leave nothing at all; the least a pen leaves, a lone thin digit partly over print, is about 0.8 mm².
 */
export const nothingWritten = 0.4
