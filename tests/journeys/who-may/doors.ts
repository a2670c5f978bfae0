import { readdirSync, readFileSync } from 'node:fs'
import path from 'node:path'

const root = path.join(import.meta.dirname, '../../..')
const app = path.join(root, 'app')

/** An action as the build knows it: `name` is its file's folder and its export, `page` a page that carries it. */
export type ActionDoor = Readonly<{ id: string; name: string; page: string }>

function filesCalled(name: string): string[] {
  return readdirSync(app, { recursive: true, encoding: 'utf8' }).filter((file) => path.basename(file) === name && !file.split(path.sep).some((part) => part.startsWith('_')))
}

/** The address of a file below app: without groups. */
function addressOf(file: string): string {
  const parts = path.dirname(file).split(path.sep).filter((part) => part !== '.' && !/^\(.*\)$/.test(part))
  return `/${parts.join('/')}`
}

/** A page of the tree: its address, and its folders with the groups that carry layouts. */
export type PageDoor = Readonly<{ address: string; folders: readonly string[] }>

/** Every page of the tree. */
export function pageDoors(): PageDoor[] {
  return filesCalled('page.tsx').map((file) => ({ address: addressOf(file), folders: path.dirname(file).split(path.sep).filter((part) => part !== '.') }))
}

/** The browser's state in which every layout around `at` is there already and only the page itself is missing. */
export function treeAround({ folders }: PageDoor, at: string): unknown {
  const given = at.split('?')[0]!.split('/').slice(1)
  const segments = folders.map((folder) => {
    if (folder.startsWith('(')) return folder
    const here = given.shift()!
    return folder.startsWith('[') ? [folder.slice(1, -1), here, 'd', null] : here
  })
  return ['', ...segments].reduceRight<unknown>((inside, segment) => [segment, { children: inside }, null, null], ['__PAGE__', {}, null, 'refetch'])
}

/** Every verb of every route of the tree, as "GET /api/health". */
export function routeDoors(): string[] {
  return filesCalled('route.ts').flatMap((file) => verbsOf(readFileSync(path.join(app, file), 'utf8')).map((verb) => `${verb} ${addressOf(file)}`)).sort()
}

function verbsOf(source: string): string[] {
  const named = [...source.matchAll(/export (?:async )?(?:function|const) (GET|HEAD|OPTIONS|POST|PUT|PATCH|DELETE)\b/g)].map((match) => match[1]!)
  const listed = [...source.matchAll(/export \{([^}]*)\}/g)].flatMap((match) => [...match[1]!.matchAll(/\b(?:as )?(GET|HEAD|OPTIONS|POST|PUT|PATCH|DELETE)\b/g)].map((verb) => verb[1]!))
  return [...named, ...listed]
}

type Manifest = Readonly<{ node: Record<string, { filename: string; exportedName: string; workers: Record<string, unknown> }> }>

/** Every action that the build lets a browser call. */
export function actionDoors(): ActionDoor[] {
  const manifest = JSON.parse(readFileSync(path.join(root, '.next/server/server-reference-manifest.json'), 'utf8')) as Manifest
  return Object.entries(manifest.node).map(([id, { filename, exportedName, workers }]) => {
    const [page] = Object.keys(workers)
    return { id, name: `${addressOf(path.relative('app', filename))} ${exportedName}`, page: addressOf(path.relative('app', page!)) }
  })
}
