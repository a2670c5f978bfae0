/**
 * Expected trouble has a code from this one list. A door turns the code into a status or an Outcome; `components/ui` turns it
 * into a sentence. Anything that is not an AppError is a bug and goes to the error screen and the log.
 */
export const errorStatus = {
  // who may
  signed_out: 401,
  not_allowed: 403,
  not_found: 404,
  // form of the input
  bad_input: 400,
  out_of_date: 409,
  already_there: 409,
  // marks
  over_maximum: 422,
  off_step: 422,
  marking_settled: 409,
  marking_unsettled: 409,
  own_first_marking: 403,
  question_withdrawn: 409,
  not_marked_yet: 409,
  // second marking
  moderator_not_blind: 409,
  sample_closed: 409,
  moderation_open: 409,
  tolerance_fixed: 409,
  no_pattern: 409,
  nothing_stamped: 409,
  nought_with_marks: 422,
  base_missing: 422,
  begun_by_other: 409,
  // setting a paper
  paper_invalid: 422,
  has_stamps: 409,
  pages_differ: 422,
  class_set_used: 409,
  last_owner: 409,
  // files
  file_empty: 422,
  file_too_large: 413,
  file_not_pdf: 422,
  file_kind_unknown: 422,
  file_heic: 422,
  files_mixed: 422,
  file_encrypted: 422,
  file_damaged: 422,
  file_no_pages: 422,
  too_many_pages: 422,
  file_same: 409,
  page_unreadable: 422,
  page_too_large: 422,
  page_incomplete: 422,
  file_locked: 422,
  code_place_bad: 422,
  code_place_missing: 409,
  // placing
  reading_marked: 409,
  place_taken: 409,
  no_registration: 422,
  name_taken: 409,
  // people
  email_taken: 409,
  user_name_taken: 409,
  password_there: 403,
  link_used: 410,
  password_wrong: 422,
  set_up_code_wrong: 422,
  no_address: 422,
  password_weak: 422,
  too_many_attempts: 429,
  last_admin: 409,
  roster_invalid: 422,
  // handing back
  checks_open: 409,
  nothing_to_return: 409,
  not_released: 404,
  page_shared: 422,
  sheaf_missing: 409,
} as const

export type ErrorCode = keyof typeof errorStatus

/** What a code needs to be put into a sentence: plain values only, never a name or the text of a comment. */
export type ErrorDetail = Readonly<Record<string, string | number | boolean | null | readonly ErrorLine[]>>
/** One faulty place in a file or form: a path or line, and what is wrong there. */
export type ErrorLine = Readonly<{ path: string; says: string }>

/** Expected trouble. Rules and tasks throw it; only doors catch it. Never read `message` to decide. */
export class AppError extends Error {
  constructor(readonly code: ErrorCode, readonly detail: ErrorDetail = {}) {
    super(code)
    this.name = 'AppError'
  }
}
