import { mkdtempSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'

// Each test file has a data folder of its own; set before lib/infra/env.ts is first read.
process.env.SHEAFMARK_DATA = mkdtempSync(path.join(tmpdir(), 'sheafmark-data-'))
process.env.SHEAFMARK_LOG = 'silent'
