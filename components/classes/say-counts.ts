export type Counts = Readonly<{ new: number; changed: number; joins: number; unchanged: number; leftAlone: number }>

/** What an import does or did, in one sentence: "28 new, 2 changed; 3 not in this file are left alone." */
export function sayCounts(counts: Counts, tense: 'plan' | 'done'): string {
  const parts = [
    counts.new > 0 && `${counts.new} new`,
    counts.joins > 0 && `${counts.joins} from another class`,
    counts.changed > 0 && `${counts.changed} changed`,
    counts.unchanged > 0 && `${counts.unchanged} unchanged`,
  ].filter((part) => part !== false)
  const alone = counts.leftAlone > 0 ? `; ${counts.leftAlone} not in this file ${tense === 'plan' ? 'will be' : 'were'} left alone` : ''
  return `${tense === 'done' ? 'Brought in: ' : ''}${parts.join(', ') || 'nobody'}${alone}.`
}
