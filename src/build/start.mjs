/** Builds the main sample and says where to look. */
import { execFileSync } from 'node:child_process'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('../..', import.meta.url))
execFileSync(
  process.execPath,
  ['dist/platemark.cjs', 'build', 'samples/boatyard.md', '--to', 'html,md,json', '--out', 'out'],
  { cwd: root, stdio: 'inherit' },
)
process.stdout.write(`
The calculation is at out/boatyard.html: open it in a browser.
Its source is samples/boatyard.md. Change a number there and run npm start again.
`)
