import { readdirSync } from 'node:fs'
import path from 'node:path'

const APP = path.resolve(import.meta.dirname, '../../../app')
/** What Next calls when a route file exports it. */
const METHODS = ['GET', 'HEAD', 'POST', 'PUT', 'PATCH', 'DELETE', 'OPTIONS'] as const
export type Method = (typeof METHODS)[number]

export interface FoundFile {
  /** `/api/vessels/{id}`; what varies stands in braces, groups are left out. */
  address: string
  file: string
}

/** Files of this name below `app/`, with the address each answers at. */
function found(name: RegExp): FoundFile[] {
  return readdirSync(APP, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && name.test(entry.name))
    .map((entry) => {
      const folder = path.relative(APP, entry.parentPath).split(path.sep)
      const parts = folder.filter((part) => part !== '' && !/^\(.*\)$/.test(part))
      const address = `/${parts.join('/')}`.replaceAll(/\[{1,2}(?:\.\.\.)?(\w+)\]{1,2}/g, '{$1}')
      return { address, file: path.join(entry.parentPath, entry.name) }
    })
    .sort((a, b) => a.address.localeCompare(b.address))
}

export const pagesOnDisk = (): FoundFile[] => found(/^page\.(tsx|ts|jsx|js|mdx)$/)

type Handler = (
  request: Request,
  context: { params: Promise<Record<string, string | string[]>> },
) => Promise<Response>
export interface FoundRoute extends FoundFile {
  handlers: Partial<Record<Method, Handler>>
}

/** Every route file with the methods it exports, whatever each of them does. */
export async function routesOnDisk(): Promise<FoundRoute[]> {
  const routes: FoundRoute[] = []
  for (const { address, file } of found(/^route\.(ts|js)$/)) {
    const exported = (await import(/* @vite-ignore */ file)) as Record<string, unknown>
    const handlers: FoundRoute['handlers'] = {}
    for (const method of METHODS) {
      const handler = exported[method]
      if (typeof handler === 'function') handlers[method] = handler as Handler // Next calls it just so
    }
    routes.push({ address, file, handlers })
  }
  return routes
}

/** Files that Next would call without a route or a page of ours: each must be known to these tests. */
export const otherEntriesOnDisk = (): string[] =>
  readdirSync(APP, { recursive: true, withFileTypes: true })
    .filter(
      (entry) =>
        entry.isFile() &&
        /^(sitemap|robots|manifest|icon|apple-icon|opengraph-image|twitter-image)\d?\.(tsx?|jsx?)$/.test(
          entry.name,
        ),
    )
    .map((entry) => path.relative(APP, path.join(entry.parentPath, entry.name)))
    .sort()

/** The route that answers a path, and what its address's varying parts are there. */
export function routeFor(
  routes: readonly FoundRoute[],
  pathname: string,
): { route: FoundRoute; params: Record<string, string | string[]> } | null {
  const parts = pathname.split('/')
  const matches = routes.flatMap((route) => {
    const wanted = route.address.split('/')
    if (wanted.length !== parts.length || route.address.endsWith('{path}')) return []
    const params: Record<string, string> = {}
    for (const [index, want] of wanted.entries()) {
      const part = parts[index] ?? ''
      const name = /^\{(\w+)\}$/.exec(want)?.[1]
      if (name === undefined ? want !== part : part === '') return []
      if (name !== undefined) params[name] = decodeURIComponent(part)
    }
    return [{ route, params, fixed: wanted.filter((want) => !want.startsWith('{')).length }]
  })
  // Next prefers what is written out.
  const [best] = matches.sort((a, b) => b.fixed - a.fixed)
  return best ?? null
}
