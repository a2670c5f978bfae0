import next from 'eslint-config-next/core-web-vitals'
import tseslint from 'typescript-eslint'

// Who may import whom: the table of DEVELOPERS.md. A folder always may import itself.
const arrows = ['setting', 'printing', 'reading', 'registering', 'placing', 'cutting', 'marking', 'second-marking', 'results', 'handing-back'].map((name) => `lib/${name}`)
// Type for PDFs that are made here: two arrows set it.
const typesetting = 'lib/typesetting'
const everything = ['lib/core', typesetting, ...arrows, 'lib/infra', 'lib/tasks', 'db', 'components', 'app', 'scripts', 'seeds', 'tests', 'migrations']
const mayImport = {
  'lib/core': [],
  [typesetting]: ['lib/core'],
  ...Object.fromEntries(arrows.map((arrow) => [arrow, ['lib/core', ...(['lib/printing', 'lib/handing-back'].includes(arrow) ? [typesetting] : [])]])),
  'lib/infra': ['lib/core'],
  db: ['lib/core', 'lib/infra'],
  'lib/tasks': ['lib/core', typesetting, ...arrows, 'lib/infra', 'db'],
  components: ['lib/core'],
  app: ['lib/core', 'lib/infra', 'lib/tasks', 'components'],
  migrations: [],
}
const forbid = (folder) =>
  everything
    .filter((other) => other !== folder && !mayImport[folder].includes(other))
    .map((other) => ({ group: [`@/${other}`, `@/${other}/**`], message: `${folder} may not know ${other}` }))
// Inside a folder by ./, anywhere else by @/. A tests or make file beside its subject follows its folder's rule.
const houseRule = Object.keys(mayImport).map((folder) => ({
  files: [`${folder}/**/*.{ts,tsx}`],
  rules: { 'no-restricted-imports': ['error', { patterns: [...(folder === 'app' ? [] : [{ group: ['../*'], message: 'use @/ outside the folder' }]), ...forbid(folder)] }] },
}))

const config = [
  { ignores: ['.next*/**', 'data/**', 'node_modules/**', 'public/**', 'tests/results/**', 'tests/report/**', 'next-env.d.ts'] },
  ...next,
  {
    files: ['**/*.{ts,tsx}'],
    languageOptions: { parser: tseslint.parser },
    plugins: { '@typescript-eslint': tseslint.plugin },
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_' }],
      '@next/next/no-img-element': 'off',
    },
  },
  // The environment is read once, through zod.
  { files: ['app/**/*.{ts,tsx}', 'components/**/*.{ts,tsx}', 'lib/**/*.ts', 'db/**/*.ts'], ignores: ['lib/infra/env.ts'], rules: { 'no-restricted-properties': ['error', { object: 'process', property: 'env', message: 'read lib/infra/env.ts' }] } },
  ...houseRule,
  // A test beside its subject may use what tests share, as the tests folder itself may.
  { files: ['**/*.test.{ts,tsx}'], rules: { 'no-restricted-imports': ['error', { patterns: [{ group: ['../*'], message: 'use @/ outside the folder' }] }] } },
]

export default config
