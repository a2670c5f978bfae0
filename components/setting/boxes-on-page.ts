import { sayMark } from '@/lib/core/marks'
import type { PaperRect } from '@/lib/core/paper-space'
import type { SettingView } from '@/lib/core/setting-view'
import type { Setting } from '@/lib/core/setting'
import { nameBox, numberBox } from './setting-edits'
import type { Hand } from './set-state'

/** A box as it is drawn on the page: its tag is what stands on it, its name what is read aloud. */
export type DrawnBox = Readonly<{ key: string; hand: Hand; rect: PaperRect; tag: string; name: string; digits: number; dashed: boolean; withdrawn: boolean }>

export function keyOfHand(hand: Hand | null): string | null {
  return hand && (hand.kind === 'space' ? hand.spaceId : hand.kind)
}

const size = ({ x, y, w, h }: PaperRect) => `${Math.round(w)} by ${Math.round(h)} points, ${Math.round(x)} from the left, ${Math.round(y)} from the top`

/** The boxes of one page in reading order, name and number first. */
export function boxesOnPage(setting: Setting, page: number, withdrawn: SettingView['withdrawnQuestions']): DrawnBox[] {
  const boxes: DrawnBox[] = []
  const name = nameBox(setting.boxes)
  const number = numberBox(setting.boxes)
  const own = { digits: 0, dashed: true, withdrawn: false }
  if (name?.page === page) boxes.push({ ...own, key: 'name', hand: { kind: 'name' }, rect: name.rect, tag: 'name', name: `Name box, ${size(name.rect)}` })
  if (number?.page === page) boxes.push({ ...own, key: 'number', hand: { kind: 'number' }, rect: number.rect, digits: number.digits, tag: 'number', name: `Boxes for the candidate number, ${number.digits} digits, ${size(number.rect)}` })
  const spaces = setting.questions.flatMap((question) => question.spaces.map((space, k) => ({ question, space, k }))).filter(({ space }) => space.page === page)
  spaces.sort((a, b) => a.space.rect.y - b.space.rect.y || a.space.rect.x - b.space.rect.x)
  for (const { question, space, k } of spaces) {
    const out = withdrawn[question.id]
    const part = question.spaces.length > 1 ? `, space ${k + 1} of ${question.spaces.length}` : ''
    boxes.push({
      key: space.id, hand: { kind: 'space', questionId: question.id, spaceId: space.id }, rect: space.rect, digits: 0, dashed: false, withdrawn: Boolean(out),
      tag: `${question.label || '?'}${k > 0 ? ' +' : ` · ${sayMark(question.maximum)}`}${out ? ' withdrawn' : ''}`,
      name: `Answer space of ${question.label || 'a question without a label'}${part}, ${sayMark(question.maximum)} ${question.maximum <= 2 ? 'mark' : 'marks'}${out ? ', withdrawn' : ''}, ${size(space.rect)}`,
    })
  }
  return boxes
}
