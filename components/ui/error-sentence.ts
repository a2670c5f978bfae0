import type { ErrorCode, ErrorDetail } from '@/lib/core/errors'

const sentences: Record<ErrorCode | 'failed', string | ((detail: ErrorDetail) => string)> = {
  failed: 'Something went wrong here, and it has been written down. Nothing you saved is lost. Try once more.',
  signed_out: 'You have been signed out. Sign in again to go on.',
  not_allowed: 'Your account may not do this here. Ask the paper’s owner or the school’s admin.',
  not_found: 'This is not here, or not for you.',
  bad_input: 'Something in this form cannot be used. Look at what is marked.',
  out_of_date: 'Someone changed this since you opened it. Load the page again.',
  already_there: 'This is there already.',
  over_maximum: 'That would go above the most this question can give. Take a stamp back first.',
  off_step: 'This paper is marked in whole marks.',
  marking_settled: 'This marking is settled. Open it again to change it.',
  marking_unsettled: 'This marking is not settled yet.',
  own_first_marking: 'Nobody second-marks their own first marking.',
  question_withdrawn: 'This question has been withdrawn from the paper.',
  not_marked_yet: 'There are answers without a mark. Mark them first.',
  nothing_stamped: 'No mark stands here yet. Give one, or press 0 for nought, R for nothing written.',
  nought_with_marks: 'A nought stands alone. Take it back first, or take the marks back.',
  base_missing: ({ point, base }) => `“${point}” counts only with “${base}”. Give that one too, or take this one back.`,
  begun_by_other: 'Another marker has begun this answer. Their stamps are safe; go on with the next one.',
  paper_invalid: 'The paper cannot be used as it is. See the lines below.',
  has_stamps: 'Marks have been given here, so it is kept. Withdraw it instead.',
  pages_differ: 'This PDF has another number of pages, or another size, than the answer spaces were drawn for.',
  file_empty: 'This file is empty. Scan or save it again and choose the new file.',
  file_too_large: ({ limitMb }) => `This file is larger than ${limitMb ?? 500} MB. Scan in grey at 200 dpi, or in two parts.`,
  file_not_pdf: 'This is not a PDF. Set the copier to save as PDF, and choose that file.',
  file_encrypted: 'This PDF asks for a password. Save a copy without one and choose that copy.',
  file_damaged: 'This PDF is damaged and cannot be opened. Copy or scan it again.',
  file_no_pages: 'This PDF has no pages. Scan it again.',
  too_many_pages: ({ most }) => `This PDF has more than ${most ?? 2000} pages. Split it and choose the parts.`,
  file_same: 'This very file is here already. Nothing was added.',
  page_unreadable: 'This page cannot be read. Scan that sheet again.',
  place_taken: 'There is a page in that place already. Take it out first, or make this one an extra page.',
  no_registration: 'The printed lines do not fit that page. Drag its four corners to show where the page lies.',
  email_taken: 'Another account has this e-mail address.',
  user_name_taken: 'Another account has this user name.',
  link_used: 'This link has been used, or its time is over. Ask for a new one.',
  password_wrong: 'That is not your password now. Type it once more.',
  set_up_code_wrong: 'This is not the set-up code. It is printed where Sheafmark was started.',
  no_address: 'This account has no e-mail address. Write one down for it first.',
  password_weak: 'Use at least 10 characters. Three words you remember are good.',
  too_many_attempts: ({ minutes }) => `Too many tries that did not fit. Wait ${minutes ?? 15} minutes, or ask the admin for a new link.`,
  last_admin: 'The school needs at least one admin who can sign in.',
  roster_invalid: 'Nothing was imported. Mend the lines below in the file and choose it again.',
  checks_open: 'Some checks are open. Clear them or sign them off by name first.',
  not_released: 'This has not been handed back.',
}

/** A code as a sentence that says what to do. */
export function errorSentence(code: ErrorCode | 'failed', detail: ErrorDetail = {}): string {
  const sentence = sentences[code]
  return typeof sentence === 'function' ? sentence(detail) : sentence
}
