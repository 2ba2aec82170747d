/** A node of a shipped text: words, or a tag with its properties and what stands in it. */
export type MinimarkNode = string | readonly [string, Record<string, unknown>, ...MinimarkNode[]]

function inline(nodes: readonly MinimarkNode[]): string {
  return nodes.map((node) => {
    if (typeof node === 'string') return node
    const [tag, , ...children] = node
    const words = inline(children)
    return tag === 'strong' ? `**${words}**` : tag === 'em' ? `*${words}*` : words
  }).join('')
}

function block(node: MinimarkNode): string {
  if (typeof node === 'string') return node
  const [tag, , ...children] = node
  if (tag === 'h2' || tag === 'h3') return `${tag === 'h2' ? '##' : '###'} ${inline(children)}`
  if (tag === 'ol' || tag === 'ul') return children.filter(child => typeof child !== 'string').map((child, index) => `${tag === 'ol' ? `${index + 1}.` : '-'} ${inline(child.slice(2) as MinimarkNode[])}`).join('\n')
  if (tag === 'lesson-caution') return `> ${children.map(child => typeof child === 'string' ? child : inline(child.slice(2) as MinimarkNode[])).join(' ')}`
  return inline(children)
}

/** The Markdown that a shipped talk could have been written as, to start a company's own from: headings, lists, bold, and cautions as quotations. */
export const markdownOf = (nodes: readonly MinimarkNode[]) => nodes.map(block).filter(text => text.trim() !== '').join('\n\n')
