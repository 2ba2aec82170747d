import remarkParse from 'remark-parse'
import remarkRehype from 'remark-rehype'
import { unified } from 'unified'

interface HastNode { type: string, value?: string, tagName?: string, properties?: Record<string, unknown>, children?: HastNode[] }
/** A node as `<ContentRenderer>` takes it. */
export interface TextNode { type: 'text' | 'element', value?: string, tag?: string, props?: Record<string, string | number>, children?: TextNode[] }
export interface TextTree { type: 'root', children: TextNode[] }

/** Tags that a company's text may hold; others fall away and their words stay. Raw HTML never becomes a node. */
const allowed: ReadonlySet<string> = new Set(['p', 'h2', 'h3', 'ul', 'ol', 'li', 'strong', 'em', 'a', 'br', 'hr', 'code', 'pre', 'lesson-caution'])
/** Headings begin below the page's own; a quotation is a caution. */
const asTag: Readonly<Record<string, string>> = { h1: 'h2', h4: 'h3', h5: 'h3', h6: 'h3', blockquote: 'lesson-caution' }
const safeLink = /^(https?:\/\/|\/(?!\/)|mailto:)/i

function toNodes(node: HastNode): TextNode[] {
  if (node.type === 'text') return [{ type: 'text', value: node.value ?? '' }]
  const children = (node.children ?? []).flatMap(toNodes)
  if (node.type !== 'element') return children
  const tag = asTag[node.tagName ?? ''] ?? node.tagName ?? ''
  if (!allowed.has(tag)) return children
  const href = String(node.properties?.href ?? '')
  if (tag === 'a') return safeLink.test(href) ? [{ type: 'element', tag, props: { href, rel: 'noopener' }, children }] : children
  const start = Number(node.properties?.start ?? 1)
  return [{ type: 'element', tag, props: tag === 'ol' && start !== 1 ? { start } : {}, children }]
}

/**
 * A company's Markdown as a tree for `<ContentRenderer>`, by the parser that the lessons use. Raw HTML, scripts,
 * pictures and links to anything but web, mail and our own pages fall away; a line that begins with > is a caution.
 */
export function toTextTree(markdown: string): TextTree {
  const processor = unified().use(remarkParse).use(remarkRehype)
  const tree = processor.runSync(processor.parse(markdown)) as unknown as HastNode
  return { type: 'root', children: (tree.children ?? []).flatMap(toNodes) }
}
