import { gzipSync } from 'node:zlib'
import { aheadOfUtc, isoSeconds, quarterOf } from './calendar.ts'
import type { Flaw, Row } from './blemishes.ts'
import type { Draws } from './seeded-draws.ts'
import type { Topic, Venue } from './story.ts'
import type { Post } from './posts.ts'

/** A file of the account, by its path inside the account folder. */
export interface ExportFile {
  readonly path: string
  readonly bytes: Uint8Array
}

/** The two exports: reviews come from a site of their own, with stars; everything else from one listening service. */
export function exportFiles(rows: readonly Row[], draws: Draws): readonly ExportFile[] {
  const reviews = rows.filter(({ post }) => post.venue === 'reviews')
  const rest = rows.filter(({ post }) => post.venue !== 'reviews')
  return [
    ...grouped(rest, (row) => quarterOf(row.post.wall)).map(([quarter, part]) => ({ path: `posts/${quarter}.csv.gz`, bytes: gzip(csv(part, draws)) })),
    ...grouped(reviews, (row) => isoSeconds(row.post.wall).slice(0, 4)).map(([year, part]) => ({ path: `reviews/${year}.ndjson`, bytes: text(part.map((row) => reviewLine(row, draws))) })),
  ]
}

const header = ['ref', 'published', 'source', 'handle', 'tone', 'theme', 'conversation', 'parent', 'about', 'customer_type', 'body']
const sourceNames: Record<Venue, readonly string[]> = {
  blogs: ['blog', 'weblog'], boards: ['forum', 'board', 'island board'], microblogs: ['short post', 'microblog'], reviews: ['trip reviews'], videos: ['video comment', 'video reply'],
}
const themeNames: Record<Topic, readonly string[]> = {
  booking: ['booking', 'app'], fares: ['fares', 'prices'], onboard: ['on board', 'food and seats'], punctuality: ['punctuality', 'timetable'], staff: ['crew', 'staff'], weather: ['weather', 'cancellations'],
}
const tones = ['negative', 'neutral', 'positive']
const badTimes = ['yesterday', '2025-13-02T10:00:00', '', '31/02/2025', 'unknown']
const badTones = ['mixed', 'n/a', '', '??']

function csv(rows: readonly Row[], draws: Draws): string {
  return [header, ...rows.map((row) => csvFields(row, draws))].map((fields) => fields.map(quoted).join(',')).join('\n') + '\n'
}

function csvFields({ post, flaw }: Row, draws: Draws): readonly string[] {
  return [
    post.ref, flaw === 'time' ? draws.pick(badTimes) : published(post), flaw === 'venue' ? '' : draws.pick(sourceNames[post.venue]), post.handle,
    flaw === 'score' ? draws.pick(badTones) : tones[post.grade], themeOf(post, draws), post.thread, post.parent, post.brand, post.segment, post.text,
  ]
}

/** Now and then an export invents a theme that the account does not know. */
function themeOf(post: Post, draws: Draws): string {
  if (post.topic === '') return ''
  return post.topic === 'onboard' && draws.chance(0.012) ? 'lost property' : draws.pick(themeNames[post.topic])
}

/** Boards write local time without an offset, blogs local time with one, the others UTC. */
function published(post: Post): string {
  if (post.venue === 'boards') return isoSeconds(post.wall)
  const ahead = aheadOfUtc(post.wall)
  if (post.venue === 'blogs') return `${isoSeconds(post.wall)}${ahead === 0 ? '+00:00' : '+01:00'}`
  return `${isoSeconds(post.wall - ahead)}Z`
}

function reviewLine(row: Row, draws: Draws): string {
  const { post, flaw } = row
  const fields = {
    review: post.ref, written: flaw === 'time' ? 'n/a' : post.wall - aheadOfUtc(post.wall), site: flaw === 'venue' ? null : draws.pick(sourceNames.reviews),
    member: post.handle === '' ? null : post.handle, stars: starsOf(post, flaw), subject: post.topic === '' ? null : themeOf(post, draws), company: post.brand, traveller: post.segment === '' ? null : post.segment,
  }
  return JSON.stringify(fields)
}

function starsOf(post: Post, flaw: Flaw): number | null {
  return flaw === 'score' ? null : post.grade + 1
}

function quoted(field: string): string {
  return /[",\n]/.test(field) ? `"${field.replaceAll('"', '""')}"` : field
}

export function text(lines: readonly string[]): Uint8Array {
  return new TextEncoder().encode(lines.join('\n') + '\n')
}

/** The gzip header is made plain: no time, no name, operating system unknown (RFC 1952), so that bytes never differ by the clock. */
function gzip(content: string): Uint8Array {
  const bytes = gzipSync(content, { level: 9 })
  bytes.fill(0, 4, 8)
  bytes[9] = 255
  return bytes
}

function grouped<T>(items: readonly T[], keyOf: (item: T) => string): readonly (readonly [string, readonly T[]])[] {
  const groups = new Map<string, T[]>()
  for (const item of items) {
    const key = keyOf(item)
    const group = groups.get(key)
    if (group) group.push(item)
    else groups.set(key, [item])
  }
  return [...groups]
}
