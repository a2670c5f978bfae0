/**
 * Text as spreadsheets save it: by its byte order mark, else UTF-8, else Windows-1252 (in which every byte is a sign).
 * Line ends become \n. Null when it is no text at all.
 */
export function decodeText(bytes: Uint8Array): string | null {
  const text = decoded(bytes)
  // A spreadsheet's own file, a PDF or a picture has nought bytes or control signs; a list has none.
  return /[\u0000-\u0008\u000e-\u001f]/.test(text) ? null : text.replace(/\r\n?/g, '\n')
}

function decoded(bytes: Uint8Array): string {
  const [first, second] = bytes
  if (first === 0xff && second === 0xfe) return new TextDecoder('utf-16le').decode(bytes)
  if (first === 0xfe && second === 0xff) return new TextDecoder('utf-16be').decode(bytes)
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  } catch {
    return new TextDecoder('windows-1252').decode(bytes)
  }
}
