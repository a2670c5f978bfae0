/** A table of a record: each row has as many cells as there are heads; the first cell names the row, the others are figures where `figures` is set. */
export type RecordTable = Readonly<{ heads: readonly string[]; rows: readonly (readonly string[])[]; figures: boolean }>
export type RecordSection = Readonly<{ heading: string; lines: readonly string[]; table: RecordTable | null }>

/** The record of a moderation in words, as the page shows it and the file prints it: neither works anything out. */
export type ModerationRecord = Readonly<{ title: string; where: string; asOf: string; sections: readonly RecordSection[] }>
export type ModerationRecordView = Readonly<{ paperId: string; sampleId: string; record: ModerationRecord }>
