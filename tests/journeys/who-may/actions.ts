import { newId } from '@/lib/core/ids'
import type { Expected } from './expectation'
import { nothing, type Objects } from './objects'

/** A list of a class as a browser sends a chosen file. */
export class ListFile {
  constructor(readonly text: string) {}
}

/** An action, by its folder and export, with what it is called with. Where a word other than a refusal stands, the input changes nothing. */
export type ActionRow = Readonly<{ door: string; of: string; with: (o: Objects) => readonly unknown[]; says: Expected }>

const action = (door: string, of: string, called: ActionRow['with'], says: Expected): ActionRow => ({ door, of, with: called, says })

const person = { givenName: 'Ruth', familyName: 'Adeyemi', email: '', userName: 'r.adeyemi', roles: ['teacher'] }
const faulty = new ListFile('candidate_number,given_name,family_name,email\n,Nobody,Atall,\n')

export const actionRows: readonly ActionRow[] = [
  //                                                                                                       nobody owner other marker moder. admin stud. mate
  action('/account changePassword', 'oneself', () => [{ old: 'not the password', password: 'a longer password' }], ' 401 422 422 422 422 422 422 422'),
  action('/new-password askForLink', 'an account that is not there', () => [{ account: `no account ${newId()}` }], ' 200 200 200 200 200 200 200 200'),
  action('/new-password choosePassword', 'no link', () => [{ token: 'none', password: 'a longer password' }], ' 410 410 410 410 410 410 410 410'),
  action('/first-admin beFirstAdmin', 'a school with people', () => [{ code: 'a code', givenName: 'A', familyName: 'B', email: 'a.b@kestrelbay.example', password: 'a longer password' }], ' 404 404 404 404 404 404 404 404'),

  ...people('add', () => [person], 'user_name_taken'),
  ...people('change', () => [nothing, person], '404'),
  ...people('disable', () => [nothing], '404'),
  ...people('enable', () => [nothing], '404'),
  ...people('send', () => [nothing], '404'),
  action('/outbox retry', 'no mail', () => [nothing], '                                                      401    403   403   403    403    404   403   403'),

  action('/classes add', 'a name that is taken', () => [{ name: '8K' }], '                                   401    409   409   403    403    409   403   403'),
  action('/classes rename', 'a class of the owner', (o) => [o.half.class, { name: o.half.className }], '     401    200   404   403    403    200   403   403'),
  action('/classes rename', 'a class of the other', (o) => [o.others.class, { name: o.others.className }], ' 401    404   200   403    403    200   403   403'),
  action('/classes setTeachers', 'a class of the owner', (o) => [o.half.class, [o.users.owner]], '           401    200   404   403    403    200   403   403'),
  action('/classes setTeachers', 'a class of the other', (o) => [o.others.class, [o.users.other]], '         401    404   200   403    403    200   403   403'),
  action('/classes giveAccountsTo', 'a class of the owner', (o) => [o.half.class, { studentIds: [o.half.hers.student], by: 'slips' }], ' 401 - 404 403 403 - 403 403'),
  action('/classes giveAccountsTo', 'students of another class', (o) => [o.others.class, { studentIds: [o.half.hers.student], by: 'slips' }], ' 401 404 404 403 403 404 403 403'),
  action('/classes takeOut', 'a class of the owner', (o) => [o.half.class, o.others.student], '              401    200   404   403    403    200   403   403'),
  action('/classes takeOut', 'a class of the other', (o) => [o.others.class, o.half.hers.student], '         401    404   200   403    403    200   403   403'),
  ...['check', 'bringIn'].flatMap((act) => [
    action(`/classes/[classId]/roster ${act}`, 'a class of the owner', (o) => [o.half.class, faulty], `       401    ${act === 'check' ? '200' : '422'}   404   403    403    ${act === 'check' ? '200' : '422'}   403   403`),
    action(`/classes/[classId]/roster ${act}`, 'a class of the other', (o) => [o.others.class, faulty], `     401    404   ${act === 'check' ? '200' : '422'}   403    403    ${act === 'check' ? '200' : '422'}   403   403`),
  ]),

  ...ofPaper('set takeQuestionOut', (o) => [{ questionId: o.half.hers.question, as: 'out', reason: 'It was not taught.' }], '-'),
  ...ofPaper('set putQuestionBack', (o) => [{ questionId: o.half.hers.question }], '200'),
  ...ofPaper('set takePointOut', (o) => [{ questionId: o.half.hers.question, pointId: o.half.point, reason: 'It was not taught.' }], '-'),
  ...ofPaper('set putPointBack', (o) => [{ questionId: o.half.hers.question, pointId: o.half.point }], '200'),
  ...ofPaper('details saveDetails', (o) => [{ paperId: o.half.paper, before: details('Before'), after: details('After') }], 'out_of_date'),
  ...ofPaper('details addSet', (o) => [{ paperId: o.half.paper, classId: o.half.class, satOn: o.half.satOn, resitOf: null }], '200'),
  ...ofPaper('details removeSet', (o) => [{ paperId: o.half.paper, classSetId: o.half.classSet }], 'class_set_used'),
  ...ofPaper('details renewSet', (o) => [{ classSetId: o.half.classSet }], '200'),
  ...ofPaper('details setAttendance', (o) => [{ classSetId: o.half.classSet, studentId: o.half.hers.student, attendance: 'absent' }], 'out_of_date'),
  ...ofPaper('details share', (o) => [{ paperId: o.half.paper, userId: o.users.owner }], '200'),
  ...ofPaper('details stopSharing', (o) => [{ paperId: o.half.paper, userId: o.users.owner }], 'last_owner'),
  ...ofPaper('details assign', (o) => [{ paperId: o.half.paper, userId: o.users.other, questionIds: [] }], '404'),
  ...ofPaper('print saveSpots', (o) => [{ paperId: o.half.paper, spots: [] }], '200'),
  ...ofPaper('print suggestSpots', (o) => [{ paperId: o.half.paper, same: false }], '200'),
  // A class or a class set of somebody else, by way of one's own paper.
  action('/papers/[paperId]/details addSet', 'a class that one does not teach', (o) => [{ paperId: o.others.paper, classId: o.half.class, satOn: '2026-11-12', resitOf: null }], ' 401 404 403 404 404 404 404 404'),
  action('/papers/[paperId]/details removeSet', 'a class set of another paper', (o) => [{ paperId: o.others.paper, classSetId: o.half.classSet }], ' 401 404 404 404 404 404 404 404'),
  ...ofPaper('grades save', (o) => [o.half.paper, { oddHalf: 'kept', boundaries: [{ grade: '1', lowest: 3999 }, { grade: '1', lowest: 3998 }] }], '400'),

  ...ofPaper('hand-back handBack', (o) => [o.half.classSet], 'checks_open'),
  ...ofPaper('hand-back withdraw', (o) => [o.half.classSet], 'not_released'),
  ...ofPaper('hand-back withdrawOne', (o) => [o.half.hers.script], 'not_released'),
  ...ofPaper('hand-back callOff', (o) => [o.half.classSet], 'not_released'),
  ...ofPaper('hand-back signOff', (o) => [{ classSetId: o.half.classSet, check: 'names', subjects: ['none'], reason: 'The hand is plain.' }], 'out_of_date'),
  ...ofPaper('hand-back takeBackSign', (o) => [{ classSetId: o.half.classSet, check: 'names', subject: 'none' }], 'out_of_date'),

  ...ofSample('draw', (o) => [{ classSetId: o.sampled.classSet, moderatorId: o.users.moderator, size: 5 }], '    401    409   404   404    403    404   404   404'),
  ...ofSample('addScript', (o) => [{ sampleId: o.sampled.sample, scriptId: o.sampled.read.script }], '           401    409   404   404    409    404   404   404'),
  ...ofSample('close', (o) => [o.sampled.sample], '                                                              401    -     404   404    403    404   404   404'),
  ...ofSample('decide', (o) => [{ responseId: o.sampled.read.response, stands: 'agreed', reason: 'judgement' }], ' 401   409   404   404    409    404   404   404'),
  ...ofSample('decide', (o) => [{ responseId: o.sampled.unread.response, stands: 'first', reason: 'judgement' }], ' 401  409   404   404    403    404   404   404'),
  ...ofSample('decide', (o) => [{ responseId: o.sampled.outside.response, stands: 'first', reason: 'judgement' }], ' 401 409   404   404    403    404   404   404'),
  ...ofSample('adjust', (o) => [{ sampleId: o.sampled.sample, questionId: o.sampled.read.question, markerId: o.users.owner, key: 'none' }], ' 401 no_pattern 404 404 403 404 404 404'),
  ...ofSample('undo', () => [nothing], '                                                                         401    404   404   404    404    404   404   404'),
  ...ofSample('beginAgreed', (o) => [{ responseId: o.sampled.unread.response, copyOf: nothing }], '              401    404   404   404    403    404   404   404'),
  ...ofSample('beginAgreed', (o) => [{ responseId: o.sampled.outside.response, copyOf: nothing }], '             401    404   404   404    403    404   404   404'),
]

/** Acts on accounts: the admin's alone. `done` is what an admin is told. */
function people(name: string, called: ActionRow['with'], done: string): ActionRow[] {
  return [action(`/people ${name}`, 'the school', called, ` 401 403 403 403 403 ${done} 403 403`)]
}

/** Acts on the half marked paper: its owner's alone. `done` is what the owner is told. */
function ofPaper(name: string, called: ActionRow['with'], done: string): ActionRow[] {
  return [action(`/papers/[paperId]/${name}`, 'the half marked paper', called, ` 401 ${done} 404 403 404 404 404 404`)]
}

function ofSample(name: string, called: ActionRow['with'], says: Expected): ActionRow[] {
  return [action(`/papers/[paperId]/second-mark ${name}`, 'the sampled paper', called, says)]
}

function details(title: string) {
  return { title, keepUntil: '2028-01-31', namesHidden: true, sampleSize: null, solutionsReleased: true }
}
