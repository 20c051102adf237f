/** Installs the packages when they are missing or the lock file has changed since. */
import { execSync } from 'node:child_process'
import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('../..', import.meta.url))
const stamp = `${root}node_modules/.platemark-lock`
const lock = readFileSync(`${root}package-lock.json`, 'utf8')

if (!existsSync(stamp) || readFileSync(stamp, 'utf8') !== lock) {
  execSync('npm ci --no-audit --no-fund', { cwd: root, stdio: 'inherit' })
  writeFileSync(stamp, lock)
}
