import type { Draws } from './seeded-draws.ts'
import type { Topic } from './story.ts'

export interface Threads {
  /** Places a new post: at the head of a new thread, or in reply to a post of a running one on the same topic. */
  readonly join: (ref: string, topic: Topic, about: string) => { readonly thread: string; readonly parent: string; readonly pull: number }
  /** Tells a thread how far its latest post stood above what was to be expected. */
  readonly heard: (thread: string, surprise: number) => void
}

interface Thread {
  readonly name: string
  readonly refs: string[]
  surprise: number
}

/** How strongly a reply follows the tone of the thread before it (on the latent scale). */
const pullOfThread = 0.25
const running = 8

/** The conversations of discussion boards: a few run at a time on each topic, and replies lean a little to the tone they find. */
export function followThreads(draws: Draws): Threads {
  const byTopic = new Map<string, Thread[]>()
  const byName = new Map<string, Thread>()
  return {
    join: (ref, topic, about) => {
      const key = `${about} ${topic}`
      const threads = byTopic.get(key) ?? []
      byTopic.set(key, threads)
      if (threads.length === 0 || draws.chance(0.25)) {
        const thread: Thread = { name: `t${byName.size.toString(36)}`, refs: [ref], surprise: 0 }
        byName.set(thread.name, thread)
        threads.push(thread)
        if (threads.length > running) threads.shift()
        return { thread: thread.name, parent: '', pull: 0 }
      }
      const thread = draws.pick(threads)
      const parent = draws.pick(thread.refs)
      const pull = (pullOfThread * thread.surprise) / thread.refs.length
      thread.refs.push(ref)
      return { thread: thread.name, parent, pull }
    },
    heard: (name, surprise) => {
      const thread = byName.get(name)
      if (thread) thread.surprise += surprise
    },
  }
}
