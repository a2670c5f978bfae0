import type { Role } from '@/lib/core/actor'

/** Everyone's password in the demo school. */
export const demoPassword = 'quietpaper'

export type DemoPerson = Readonly<{ userName: string; givenName: string; familyName: string; roles: readonly Role[]; says: string }>

/** Staff of our own invented Kestrel Bay School. */
export const demoStaff: readonly DemoPerson[] = [
  { userName: 'r.adeyemi', givenName: 'Ruth', familyName: 'Adeyemi', roles: ['teacher', 'marker'], says: 'teacher: owns the papers' },
  { userName: 'h.moss', givenName: 'Helen', familyName: 'Moss', roles: ['teacher'], says: 'teacher: a paper and a class of her own' },
  { userName: 'm.osei', givenName: 'Marcus', familyName: 'Osei', roles: ['marker'], says: 'marker: marks some questions' },
  { userName: 'k.lindqvist', givenName: 'Karin', familyName: 'Lindqvist', roles: ['moderator', 'marker'], says: 'moderator: second-marks a sample' },
  { userName: 'a.whitcombe', givenName: 'Ada', familyName: 'Whitcombe', roles: ['admin'], says: 'admin: people, classes, mails, audit' },
]

/** Students of the class set that is handed back; the user name is the candidate number. */
export const demoStudents = [
  { userName: '6113', says: 'student: a returned script' },
  { userName: '6115', says: 'student: another one of the same class' },
] as const
