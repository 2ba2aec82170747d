import { IncomingMessage } from 'node:http'
import type { H3Event } from 'h3'

/** True for the framework's own calls while it renders a page; false for everything that came over the network. */
export const isInternal = (event: H3Event) => !(event.node.req instanceof IncomingMessage)
