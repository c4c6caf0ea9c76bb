import type {} from 'remark-directive'
import type {} from 'remark-rehype'
import type { Root, RootContent } from 'mdast'
import type { Table } from '../../tables/table.ts'
import type { Words } from '../../words/words.ts'
import type { Reporter } from '../faults.ts'
import type { Scope } from '../path.ts'
import type { TypeScope } from '../path-types.ts'
import type { Sentences } from '../sentences.ts'
import type { Unread } from '../template.ts'

export type TextDirective = Extract<RootContent, { type: 'textDirective' }>
export type LeafDirective = Extract<RootContent, { type: 'leafDirective' }>
export type ContainerDirective = Extract<RootContent, { type: 'containerDirective' }>
export type DirectiveNode = TextDirective | LeafDirective | ContainerDirective
export type DirectiveType = DirectiveNode['type']

/** A file that `::include` names, as a tree. */
export interface Included {
  readonly place: string
  readonly tree: Root
}

/** What the review calls; filled while it is checked, from its first line to its last. */
export interface Calls {
  readonly sections: Set<string>
  readonly charts: Set<string>
  /** Where `::notes` stands: in which section, or null for the review itself. */
  readonly notes: (string | null)[]
  inclusions: number
}

/** What a directive is checked against, whatever the findings of the month. */
export interface CheckContext {
  readonly words: Words
  readonly sentences: Sentences
  readonly charts: readonly string[]
  readonly tables: readonly Table[]
  readonly sections: readonly string[]
  /** The house's own review, as it stands. */
  readonly house: readonly RootContent[]
  readonly included: ReadonlyMap<string, Included | Unread>
  /** Ids that a link inside the document may lead to. */
  readonly anchors: ReadonlySet<string>
  /** Those of sections that the review leaves out: what the house says of them falls away with them, a link of the account's own is a fault. */
  readonly leftOut: ReadonlySet<string>
  readonly calls: Calls
  /** The section that is being checked; null in the review itself. */
  readonly inSection: string | null
  /** Files that stand around the one that is being checked, by `::include`. */
  readonly within: readonly string[]
  /** Whether it is an analyst's note, in which `:figure` is the only directive. */
  readonly inNote: boolean
  readonly check: (nodes: readonly RootContent[], scope: TypeScope, context: CheckContext, reporter: Reporter) => void
}

/** What a directive is filled from. */
export interface FillContext {
  readonly words: Words
  readonly sentences: Sentences
  readonly tables: readonly Table[]
  readonly house: readonly RootContent[]
  readonly included: ReadonlyMap<string, Included | Unread>
  /** Tree of a section, filled in the scope of the whole findings. */
  readonly section: (name: string) => readonly RootContent[]
  /** The analyst's note beside a section, or the general one (null): a block, or nothing. */
  readonly note: (section: string | null) => readonly RootContent[]
  /** Of the file that is being filled; what only the figures of a period can show to be wrong is told by it. */
  readonly reporter: Reporter
  /** Fill nodes of this file, or of another one that stands in its place. */
  readonly fill: (nodes: readonly RootContent[], scope: Scope, reporter: Reporter) => readonly RootContent[]
}

/** One use of a directive in a template. */
export interface Use {
  readonly node: DirectiveNode
  readonly attributes: Readonly<Record<string, string>>
}

/**
 * A word of the template language. Checking knows types and no values, filling knows values and finds nothing wrong:
 * so a template's faults don't depend on the month.
 */
export interface Directive {
  readonly type: DirectiveType
  readonly name: string
  /** Attributes that must, and that may, be given. */
  readonly needs: readonly string[]
  readonly may: readonly string[]
  /** Report what is wrong; returns the scope that the children are checked in. */
  readonly check: (use: Use, scope: TypeScope, context: CheckContext, reporter: Reporter) => TypeScope
  /** What stands in its place; `children` fills the directive's own children in a scope. */
  readonly fill: (use: Use, scope: Scope, context: FillContext, children: (scope: Scope) => readonly RootContent[]) => readonly RootContent[]
}
