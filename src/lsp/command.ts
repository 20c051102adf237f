/** `platemark lsp`: a language server on the standard streams. Loaded only when it is asked for. */
import { join } from 'node:path'
import { setFlagsFromString } from 'node:v8'
import { createConnection, ProposedFeatures } from 'vscode-languageserver/node'
import { hostAt } from '../host.ts'
import { serve } from './server.ts'

/**
 * @returns a promise that stays open: the protocol's `exit`, or the end of the input, ends the process
 */
export function serveEditor(): Promise<never> {
  // The launcher puts off optimised code for the sake of short runs; this one is long.
  if (process.versions.node.startsWith('20.')) setFlagsFromString('--interrupt-budget=67584')
  const connection = createConnection(ProposedFeatures.all, process.stdin, process.stdout)
  const survive = (error: unknown) =>
    connection.console.error(error instanceof Error ? (error.stack ?? error.message) : String(error))
  process.on('uncaughtException', survive)
  process.on('unhandledRejection', survive)
  serve(connection, hostAt(join(__dirname, 'assets')))
  connection.listen()
  return new Promise(() => undefined)
}
