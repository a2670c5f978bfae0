import type { Expected } from './expectation'
import { nothing, type AnswerOf, type Objects } from './objects'

/** What a request carries: JSON, bytes or a form. */
export type Carried = Readonly<{ data?: unknown; multipart?: Record<string, string>; form?: Record<string, string>; headers?: Record<string, string> }>
/** A verb of a route on an object. Where a word other than a refusal stands for a changing verb, the input is one that changes nothing. */
export type RouteRow = Readonly<{ door: string; of: string; at: (o: Objects) => string; with?: (o: Objects) => Carried; says: Expected }>

const route = (door: string, of: string, at: RouteRow['at'], says: Expected): RouteRow => ({ door, of, at, says })
const change = (door: string, of: string, at: RouteRow['at'], carried: (o: Objects) => Carried, says: Expected): RouteRow => ({ door, of, at, with: carried, says })
const json = (data: (o: Objects) => unknown) => (o: Objects): Carried => ({ data: data(o) })

export const routeRows: readonly RouteRow[] = [
  //                                                                                                                          nobody owner other marker moder. admin stud. mate
  ...['mark-book', 'mark-book-csv', 'paper-file', 'setting', 'sheaves', 'sorting', 'hand-back'].flatMap((what) => {
    const door = `GET /api/papers/[paperId]/${what}`
    return [
      route(door, 'the half marked paper', (o) => `/api/papers/${o.half.paper}/${what}`, `                                     401    200   404   ${what === 'mark-book' ? 200 : 403}    404    404   404   404`),
      route(door, 'the sampled paper', (o) => `/api/papers/${o.sampled.paper}/${what}`, '                                      401    200   404   404    403    404   404   404'),
      route(door, 'the paper of the other', (o) => `/api/papers/${o.others.paper}/${what}`, '                                  401    404   200   404    404    404   404   404'),
      route(door, 'no paper', () => `/api/papers/${nothing}/${what}`, '                                                        401    404   404   404    404    404   404   404'),
    ]
  }),
  route('GET /api/papers/[paperId]/mark-book', 'a class set of another paper', (o) => `/api/papers/${o.others.paper}/mark-book?classSet=${o.half.classSet}`, ' 401 404 404 404 404 404 404 404'),
  route('GET /api/papers/[paperId]/mark-book-csv', 'a class set of another paper', (o) => `/api/papers/${o.others.paper}/mark-book-csv?classSet=${o.half.classSet}`, ' 401 404 404 404 404 404 404 404'),
  route('GET /api/papers/[paperId]/hand-back', 'a class set of another paper', (o) => `/api/papers/${o.others.paper}/hand-back?classSet=${o.half.classSet}`, ' 401 404 404 404 404 404 404 404'),

  route('GET /api/samples/[sampleId]/record', 'the sample', (o) => `/api/samples/${o.sampled.sample}/record`, '                401    200   404   404    403    404   404   404'),
  route('GET /api/samples/[sampleId]/record', 'no sample', () => `/api/samples/${nothing}/record`, '                           401    404   404   404    404    404   404   404'),

  // The blank paper: for all who mark it.
  ...['pages/1', 'blank'].flatMap((what) => {
    const door = `GET /api/papers/[paperId]/${what === 'blank' ? what : 'pages/[page]'}`
    return [
      route(door, 'the half marked paper', (o) => `/api/papers/${o.half.paper}/${what}`, '                                     401    200   404   200    404    404   404   404'),
      route(door, 'the sampled paper', (o) => `/api/papers/${o.sampled.paper}/${what}`, '                                      401    200   404   404    200    404   404   404'),
      route(door, 'the paper of the other', (o) => `/api/papers/${o.others.paper}/${what}`, '                                  401    404   200   404    404    404   404   404'),
    ]
  }),

  ...run('a question of the marker', (o) => o.half.paper, (o) => o.half.theirs, 'first', '                                    401    200   404   200    404    404   404   404'),
  ...run('a question of the owner alone', (o) => o.half.paper, (o) => o.half.hers, 'first', '                                 401    200   404   403    404    404   404   404'),
  ...run('first marks of the sampled paper', (o) => o.sampled.paper, (o) => o.sampled.unread, 'first', '                      401    200   404   404    403    404   404   404'),
  ...run('the sample', (o) => o.sampled.paper, (o) => o.sampled.unread, 'second', '                                           401    403   404   404    200    404   404   404'),
  ...run('agreed marks', (o) => o.sampled.paper, (o) => o.sampled.read, 'agreed', '                                           401    200   404   404    200    404   404   404'),
  ...run('a question of another paper', (o) => o.others.paper, (o) => o.half.hers, 'first', '                                 401    404   404   404    404    404   404   404'),

  // Pictures: a marker sees the answers they mark and the pages of those scripts, a moderator those of the sample. A student sees no scan but in their own file.
  ...strip('an answer of the marker', (o) => o.half.theirs, '                                                                 401    200   404   200    404    404   404   404'),
  ...strip('an answer of the owner alone', (o) => o.half.hers, '                                                              401    200   404   403    404    404   404   404'),
  ...strip('an answer of the sample', (o) => o.sampled.unread, '                                                              401    200   404   404    200    404   404   404'),
  ...strip('an answer outside the sample', (o) => o.sampled.outside, '                                                        401    200   404   404    403    404   404   404'),
  route('GET /api/strips/[responseId]/[spaceId]', 'the space of another question', (o) => `/api/strips/${o.half.theirs.response}/${o.half.hers.space}`, ' 401 404 404 404 404 404 404 404'),
  ...scriptPage('a script of the marker', (o) => o.half.theirs, '                                                             401    200   404   200    404    404   404   404'),
  ...scriptPage('a script of the sample', (o) => o.sampled.unread, '                                                          401    200   404   404    200    404   404   404'),
  ...scriptPage('a script outside the sample', (o) => o.sampled.outside, '                                                    401    200   404   404    403    404   404   404'),
  // Whole leaves with the name on them: only for whoever sorts the paper.
  ...['picture?width=80', 'crop?box=name', 'crop?box=hand'].flatMap((what) => {
    const door = `GET /api/leaves/[leafId]/${what.split('?')[0]}`
    return [
      route(door, `a leaf of the half marked paper, ${what}`, (o) => `/api/leaves/${o.half.theirs.leaf}/${what}`, '           401    200   404   403    404    404   404   404'),
      route(door, `a leaf of the sample, ${what}`, (o) => `/api/leaves/${o.sampled.unread.leaf}/${what}`, '                   401    200   404   404    403    404   404   404'),
      route(door, `no leaf, ${what}`, () => `/api/leaves/${nothing}/${what}`, '                                               401    404   404   404    404    404   404   404'),
    ]
  }),
  route('GET /api/returned/[returnedScriptId]/pdf', 'the file of the student', (o) => `/api/returned/${o.back.student}/pdf`, ' 401   200   404   404    404    404   200   404'),
  route('GET /api/returned/[returnedScriptId]/pdf', 'the file of the classmate', (o) => `/api/returned/${o.back.mate}/pdf`, '  401   200   404   404    404    404   404   200'),
  route('GET /api/returned/[returnedScriptId]/pdf', 'no file', () => `/api/returned/${nothing}/pdf`, '                         401   404   404   404    404    404   404   404'),

  ...['returned-zip', 'returned-pdf'].flatMap((what) => {
    const door = `GET /api/class-sets/[classSetId]/${what}`
    return [
      route(door, 'the class that is handed back', (o) => `/api/class-sets/${o.back.classSet}/${what}`, '                      401    200   404   403    404    404   404   404'),
      route(door, 'a class that is not', (o) => `/api/class-sets/${o.half.classSet}/${what}`, '                                401    404   404   403    404    404   404   404'),
      route(door, 'the class of the other', (o) => `/api/class-sets/${o.others.classSet}/${what}`, '                           401    404   404   404    404    404   404   404'),
      route(door, 'no class', () => `/api/class-sets/${nothing}/${what}`, '                                                    401    404   404   404    404    404   404   404'),
    ]
  }),
  change('POST /api/classes/[classId]/slips', 'the class of the other', (o) => `/api/classes/${o.others.class}/slips`, json(() => ({ sheet: 'a4', slips: [{ name: 'Sam', userName: '1', code: 'K' }] })), ' 401 404 200 403 403 200 403 403'),
  // With the marks on it: markers get those of their questions, a moderator those they need not read blind.
  route('GET /api/scripts/[scriptId]/annotated-pdf', 'a script the marker marks', (o) => `/api/scripts/${o.half.theirs.script}/annotated-pdf`, ' 401 200 404 200 404 404 404 404'),
  route('GET /api/scripts/[scriptId]/annotated-pdf', 'a script of the sample', (o) => `/api/scripts/${o.sampled.unread.script}/annotated-pdf`, ' 401 200 404 404 200 404 404 404'),
  route('GET /api/scripts/[scriptId]/annotated-pdf', 'a script outside the sample', (o) => `/api/scripts/${o.sampled.outside.script}/annotated-pdf`, ' 401 200 404 404 403 404 404 404'),
  route('GET /api/scripts/[scriptId]/annotated-pdf', 'no script', () => `/api/scripts/${nothing}/annotated-pdf`, ' 401 404 404 404 404 404 404 404'),

  // Setting and scanning.
  ...onPapers('GET', 'demo-pile', () => ({}), '200'),
  change('POST /api/papers', 'a paper without a title', () => '/api/papers', () => ({ multipart: { form: JSON.stringify({ id: nothing, title: '', step: 1, classSets: [] }) } }), ' 401 400 400 403 403 403 403 403'),
  ...onPapers('POST', 'blank', json(() => 'not a PDF'), 'file_not_pdf'),
  ...onPapers('POST', 'paper-file?version=1', json(() => ({})), 'paper_invalid'),
  ...onPapers('POST', 'setting', json(() => ({ version: 4711, setting: { step: 1, tolerance: 3, boxes: [], questions: [] } })), 'out_of_date'),
  ...onPapers('POST', 'sheaves', json(() => ({ uploadId: '0'.repeat(32), classSetIds: [nothing] })), 'bad_input'),
  change('POST /api/papers/[paperId]/print-pack', 'the half marked paper', (o) => `/api/papers/${o.half.paper}/print-pack`, (o) => ({ data: { classSetId: o.half.classSet, spares: 0, twoSided: false } }), ' 401 code_place_missing 404 403 404 404 404 404'),
  change('POST /api/papers/[paperId]/print-pack', 'a class set of another paper', (o) => `/api/papers/${o.others.paper}/print-pack`, (o) => ({ data: { classSetId: o.half.classSet, spares: 0, twoSided: false } }), ' 401 404 404 404 404 404 404 404'),
  ...onPapers('OPTIONS', 'sheaves/upload', () => ({}), '204'),
  ...onPapers('POST', 'sheaves/upload', () => ({}), '412'),
  ...(['GET', 'HEAD', 'PATCH', 'DELETE'] as const).flatMap((verb) => onPapers(verb, `sheaves/upload/${'0'.repeat(32)}`, () => ({}), '404')),
  change('POST /api/sheaves/[sheafId]/again', 'a sheaf that is read', (o) => `/api/sheaves/${o.half.sheaf}/again`, () => ({}), ' 401 409 404 403 404 404 404 404'),
  change('POST /api/sheaves/[sheafId]/again', 'a sheaf of the sample', (o) => `/api/sheaves/${o.sampled.sheaf}/again`, () => ({}), ' 401 409 404 404 403 404 404 404'),
  change('POST /api/sheaves/[sheafId]/stop', 'a sheaf that is read', (o) => `/api/sheaves/${o.half.sheaf}/stop`, () => ({}), '  401 409 404 403 404 404 404 404'),
  change('POST /api/sheaves/[sheafId]/stop', 'a sheaf of the sample', (o) => `/api/sheaves/${o.sampled.sheaf}/stop`, () => ({}), '  401 409 404 404 403 404 404 404'),

  // Sorting: by way of the paper itself, and by way of a paper of one's own.
  ...sorting('a leaf put where no page is', (o) => ({ act: 'place', leafId: o.loose.leaf, target: { scriptId: o.loose.placed.script }, paperPage: 40 }), 'bad_input'),
  ...sorting('a leaf put in as an extra page', (o) => ({ act: 'extra', leafId: o.loose.leaf, target: { scriptId: o.loose.placed.script } }), '-'),
  ...sorting('a loose leaf laid loose', (o) => ({ act: 'lay', leafId: o.loose.leaf, to: 'loose' }), 'out_of_date'),
  ...sorting('a placed leaf turned', (o) => ({ act: 'turn', leafId: o.loose.placed.leaf, turn: 90 }), 'out_of_date'),
  ...sorting('a name that another script bears', (o) => ({ act: 'name', scriptId: o.loose.nameless, classSetId: o.loose.classSet, studentId: o.loose.placed.student }), 'name_taken'),
  ...sorting('the name of a nameless script taken away', (o) => ({ act: 'unname', scriptId: o.loose.nameless }), 'out_of_date'),
  ...sorting('the absence of who has a script', (o) => ({ act: 'attendance', classSetId: o.loose.classSet, studentId: o.loose.placed.student, attendance: 'absent' }), 'out_of_date'),
  ...onPapers('POST', 'sorting', json(() => ({ act: 'undo' })), '-'),

  // Marking. What is settled answers that it is; what another has begun, that they have.
  ...stamp('an answer of the marker', (o) => o.half.theirs, 'first', '                                                        401    409   404   409    404    404   404   404'),
  ...stamp('an answer of the owner alone', (o) => o.half.unmarked, 'first', '                                                 401    400   404   403    404    404   404   404'),
  ...stamp('a first mark in the sample', (o) => o.sampled.unread, 'first', '                                                  401    409   404   404    403    404   404   404'),
  ...stamp('a second mark in the sample', (o) => o.sampled.unread, 'second', '                                                401    403   404   404    400    404   404   404'),
  ...stamp('a second mark outside the sample', (o) => o.sampled.outside, 'second', '                                          401    403   404   404    403    404   404   404'),
  ...stamp('an agreed mark before reading', (o) => o.sampled.unread, 'agreed', '                                              401    400   404   404    403    404   404   404'),
  ...stamp('an agreed mark outside the sample', (o) => o.sampled.outside, 'agreed', '                                         401    400   404   404    403    404   404   404'),
  ...marking('reopen', 'an answer of the owner alone', (o) => o.half.unmarked, 'first', '                                     401    200   404   403    404    404   404   404'),
  ...marking('reopen', 'an answer of the marker', (o) => o.half.theirs, 'first', '                                            401    409   404   -      404    404   404   404'),
  ...marking('reopen', 'a second mark outside the sample', (o) => o.sampled.outside, 'second', '                              401    403   404   404    403    404   404   404'),
  ...marking('reopen', 'a second mark in the sample', (o) => o.sampled.unread, 'second', '                                    401    403   404   404    200    404   404   404'),
  ...marking('reopen', 'a settled second mark', (o) => o.sampled.read, 'second', '                                            401    403   404   404    409    404   404   404'),
  ...marking('settle', 'an answer of the marker', (o) => o.half.theirs, 'first', '                                            401    409   404   200    404    404   404   404'),
  ...marking('settle', 'an answer of the owner alone', (o) => o.half.unmarked, 'first', '                                     401    409   404   403    404    404   404   404'),
  ...marking('settle', 'a second mark outside the sample', (o) => o.sampled.outside, 'second', '                              401    403   404   404    403    404   404   404'),
  ...marking('settle', 'a second mark in the sample', (o) => o.sampled.unread, 'second', '                                    401    403   404   404    409    404   404   404'),
  ...flag('an answer of the marker', (o) => o.half.theirs, 'first', '                                                         401    -     404   -      404    404   404   404'),
  ...flag('an answer of the owner alone', (o) => o.half.hers, 'first', '                                                      401    -     404   403    404    404   404   404'),
  ...flag('an answer outside the sample', (o) => o.sampled.outside, 'second', '                                               401    403   404   404    403    404   404   404'),

  // Open to everyone: they say nothing of the school.
  route('GET /api/health', 'the server', () => '/api/health', '                                                               200    200   200   200    200    200   200   200'),
  route('GET /api/auth/[...nextauth]', 'the sign-in', () => '/api/auth/csrf', '                                               200    200   200   200    200    200   200   200'),
  change('POST /api/auth/[...nextauth]', 'a sign-in without its token', () => '/api/auth/callback/credentials', () => ({ form: { account: 'r.adeyemi', password: 'quietpaper' } }), ' 302 302 302 302 302 302 302 302'),
]

/** A changing verb on each paper; `done` is what whoever may change it is told. */
function onPapers(verb: string, what: string, carried: (o: Objects) => Carried, done: string): RouteRow[] {
  const door = `${verb} /api/papers/[paperId]/${what.startsWith('sheaves/upload') ? 'sheaves/upload/[[...path]]' : what.split('?')[0]}`
  return [
    change(door, `the half marked paper, ${what}`, (o) => `/api/papers/${o.half.paper}/${what}`, carried, ` 401 ${done} 404 403 404 404 404 404`),
    change(door, `the sampled paper, ${what}`, (o) => `/api/papers/${o.sampled.paper}/${what}`, carried, ` 401 ${done} 404 404 403 404 404 404`),
    change(door, `the paper of the other, ${what}`, (o) => `/api/papers/${o.others.paper}/${what}`, carried, ` 401 404 ${done} 404 404 404 404 404`),
  ]
}

function run(of: string, paper: (o: Objects) => string, answer: (o: Objects) => AnswerOf, round: string, says: Expected): RouteRow[] {
  return [route('GET /api/papers/[paperId]/runs/[questionId]', `${of}, ${round}`, (o) => `/api/papers/${paper(o)}/runs/${answer(o).question}?round=${round}`, says)]
}

function strip(of: string, answer: (o: Objects) => AnswerOf, says: Expected): RouteRow[] {
  return [route('GET /api/strips/[responseId]/[spaceId]', of, (o) => `/api/strips/${answer(o).response}/${answer(o).space}?dpi=72`, says)]
}

function scriptPage(of: string, answer: (o: Objects) => AnswerOf, says: Expected): RouteRow[] {
  return [route('GET /api/script-pages/[scriptPageId]/picture', of, (o) => `/api/script-pages/${answer(o).page}/picture?dpi=72`, says)]
}

function sorting(of: string, act: (o: Objects) => unknown, done: string): RouteRow[] {
  const door = 'POST /api/papers/[paperId]/sorting'
  return [
    change(door, of, (o) => `/api/papers/${o.loose.paper}/sorting`, json(act), ` 401 ${done} 404 404 404 404 404 404`),
    change(door, `${of}, by way of another paper`, (o) => `/api/papers/${o.others.paper}/sorting`, json(act), ` 401 ${done} 404 404 404 404 404 404`),
  ]
}

/** A stamp on a page of another script: whoever may stamp this answer is told that it does not lie there. */
function stamp(of: string, answer: (o: Objects) => AnswerOf, round: string, says: Expected): RouteRow[] {
  const pressed = (o: Objects) => ({ id: nothing, responseId: answer(o).response, round, version: 1, kind: 'tick', worth: 2, markPointId: null, scriptPageId: o.loose.placed.page, x: 100, y: 100 })
  return [change('PUT /api/stamps/[stampId]', `${of}, ${round}`, () => `/api/stamps/${nothing}`, json(pressed), says)]
}

function marking(act: 'settle' | 'reopen', of: string, answer: (o: Objects) => AnswerOf, round: string, says: Expected): RouteRow[] {
  return [change(`POST /api/markings/${act}`, `${of}, ${round}`, () => `/api/markings/${act}`, json((o) => ({ responseId: answer(o).response, round })), says)]
}

function flag(of: string, answer: (o: Objects) => AnswerOf, round: string, says: Expected): RouteRow[] {
  return [change('POST /api/flags', `${of}, ${round}`, () => '/api/flags', json((o) => ({ responseId: answer(o).response, round, note: 'Is this a 4 or a 9?' })), says)]
}
