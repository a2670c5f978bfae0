/** What a run of type is for: note (serif italic 500), code and worth (sans 700), figure (sans 600). */
export type FontRole = 'note' | 'code' | 'worth' | 'figure'

/** The face behind each role: `book` is Literata, `sans` Atkinson Hyperlegible Next. */
export const fontOf: Readonly<Record<FontRole, Readonly<{ family: 'sans' | 'book'; weight: 500 | 600 | 700; italic: boolean }>>> = {
  note: { family: 'book', weight: 500, italic: true },
  code: { family: 'sans', weight: 700, italic: false },
  worth: { family: 'sans', weight: 700, italic: false },
  figure: { family: 'sans', weight: 600, italic: false },
}

// Advance widths of U+0020 to U+007E in thousandths of the type size, read from the static latin files (version 5.3.0). Lines
// break here and not in a painter, so that screen and paper break alike.
const note = table(
  '190 346 419 682 518 833 753 262 351 351 479 582 341 358 330 451 599 404 531 540 574 537 557 526 547 550 337 347 582 582 582 522 898 704 634 632 751 604 574 661 774 373 382 709 597 957 753 730 615 719 699 518 639 765 703 1017 707 682 628 341 430 344 601 503 498 591 585 499 593 492 395 571 602 310 308 561 294 894 610 555 597 562 483 459 410 606 543 799 545 547 490 379 420 379 593',
)
const bold = table(
  '312 303 390 765 610 969 725 210 335 335 485 595 271 373 272 440 659 440 579 600 624 607 626 537 624 571 272 272 569 612 569 547 781 678 643 658 688 597 566 718 701 424 561 663 552 858 717 746 629 756 650 610 607 686 644 886 685 650 618 340 440 344 582 400 288 552 596 510 596 563 365 593 571 300 259 555 318 882 571 576 596 599 376 508 376 567 530 740 539 521 505 381 254 381 537',
)
const figure = table(
  '303 298 362 730 604 953 727 195 324 324 485 598 252 369 253 424 656 430 569 592 621 602 617 529 621 578 253 253 564 617 564 526 780 662 634 654 683 589 562 711 699 415 546 654 548 848 710 737 617 747 639 604 592 687 628 877 666 627 615 333 424 344 573 391 274 544 587 502 586 555 349 582 565 285 255 536 301 870 565 567 587 591 368 497 360 559 509 723 522 499 492 370 249 370 543',
)
const widths: Readonly<Record<FontRole, readonly number[]>> = { note, code: bold, worth: bold, figure }
const halfWidth: Readonly<Record<FontRole, number>> = { note: 948, code: 852, worth: 852, figure: 843 }
/** A letter outside the table: about the widest ordinary small letter, so that a line is rather too short than too long. */
const otherWidth = 610

function table(advances: string): readonly number[] {
  return advances.split(' ').map(Number)
}

/** The width in points of a run set at `size` points, without letter spacing. Accented letters count as their base letter. */
export function widthOf(text: string, role: FontRole, size: number): number {
  let thousandths = 0
  for (const letter of text) {
    const base = letter.normalize('NFD').charCodeAt(0)
    thousandths += letter === '½' ? halfWidth[role] : (widths[role][base - 32] ?? otherWidth)
  }
  return (thousandths / 1000) * size
}

