/** Builds the main sample and says where to look. */
import { spawnSync } from 'node:child_process'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('../..', import.meta.url))

/** @param {string} to */
const build = to =>
  spawnSync(process.execPath, ['dist/platemark.cjs', 'build', 'samples/boatyard.md', '--to', to, '--out', 'out'], {
    cwd: root,
    stdio: 'inherit',
  }).status === 0

if (!build('html,md,json')) process.exit(1)
// A machine for which no browser can be had still has the page.
const printed = build('pdf')
process.stdout.write(`
The calculation is at out/boatyard.html${printed ? ', and as PDF at out/boatyard.pdf' : ''}: open it.
Its source is samples/boatyard.md. Change a number there and run npm start again.
`)
