/** A mail as the school sends it: a few plain lines and at most one link. */
export type PlainMail = Readonly<{ greeting: string; lines: readonly string[]; link?: Readonly<{ says: string; href: string }>; after?: readonly string[]; school: string }>

/** The same words twice: as text, and as HTML without pictures, styles from elsewhere or anything that calls home. */
export function plainMail(mail: PlainMail): { text: string; html: string } {
  const { link, after = [] } = mail
  const text = [mail.greeting, ...mail.lines, ...(link ? [`${link.says}:\n${link.href}`] : []), ...after, mail.school].join('\n\n')
  const paragraphs = [
    mail.greeting, ...mail.lines,
  ].map((line) => `<p>${escaped(line)}</p>`)
  if (link) paragraphs.push(`<p><a href="${escaped(link.href)}">${escaped(link.says)}</a></p>`)
  paragraphs.push(...[...after, mail.school].map((line) => `<p>${escaped(line)}</p>`))
  return { text: `${text}\n`, html: `<!doctype html><html lang="en-GB"><body style="font:16px/24px Verdana,sans-serif;color:#17233F">${paragraphs.join('')}</body></html>` }
}

function escaped(text: string): string {
  return text.replace(/[&<>"]/g, (sign) => ({ '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' })[sign]!)
}
