/** The system's own way to show an address. */
import { spawn } from 'node:child_process'

const programs: Readonly<Record<string, readonly string[]>> = {
  darwin: ['open'],
  win32: ['rundll32', 'url.dll,FileProtocolHandler'],
}

/** @returns false where no program could be started */
export function openBrowser(address: string): Promise<boolean> {
  const [program = 'xdg-open', ...args] = programs[process.platform] ?? ['xdg-open']
  return new Promise(done => {
    const child = spawn(program, [...args, address], { stdio: 'ignore', detached: true })
    child.once('spawn', () => {
      child.unref()
      done(true)
    })
    child.once('error', () => done(false))
  })
}
