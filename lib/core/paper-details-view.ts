/** What stands about a paper beside its scheme; the form sends it back whole. */
export type PaperDetails = Readonly<{ title: string; keepUntil: string; namesHidden: boolean; sampleSize: number | null; solutionsReleased: boolean }>
type Person = Readonly<{ userId: string; givenName: string; familyName: string }>

/** A student as the list of a class set stood, with the script that bears their name, if any. */
export type SetStudentView = Readonly<{ studentId: string; candidateNumber: string; givenName: string; familyName: string; attendance: 'expected' | 'absent' | 'excused'; scriptId: string | null }>
export type ClassSetView = Readonly<{ id: string; className: string; satOn: string; resitOf: string | null; students: number; absent: number; scripts: number; list: readonly SetStudentView[] }>

/** All about a paper that is not drawn on it. */
export type PaperDetailsView = Readonly<{
  paperId: string
  /** The scheme's version: an import names the one it was made on. */
  version: number
  details: PaperDetails
  blank: Readonly<{ name: string; size: number; pages: number }> | null
  questions: readonly Readonly<{ id: string; label: string }>[]
  classSets: readonly ClassSetView[]
  /** This person's own classes. */
  classes: readonly Readonly<{ id: string; name: string }>[]
  owners: readonly Person[]
  /** A null question is every question. */
  markers: readonly (Person & Readonly<{ questionId: string | null }>)[]
  teachers: readonly Person[]
  allMarkers: readonly Person[]
}>
