import style from './sorting.module.css'

/** Name and candidate number as written, side by side. */
export function NameBoxes({ leafId, boxes, of }: { leafId: string; boxes: readonly ('name' | 'number')[]; of: string }) {
  return (
    <span className={style.boxes}>
      {boxes.map((box) => <img key={box} className={style[box]} src={`/api/leaves/${leafId}/crop?box=${box}`} alt={`${box === 'name' ? 'name' : 'candidate number'} as written, ${of}`} loading="lazy" />)}
    </span>
  )
}
