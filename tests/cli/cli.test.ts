/** The command itself, as a process: exit codes, what it writes, and what it leaves alone. */
import { spawnSync } from 'node:child_process'
import { existsSync, mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import Ajv from 'ajv'
import { afterAll, beforeEach, describe, expect, test } from 'vitest'
import schema from '../../src/render/results.schema.json'

const command = fileURLToPath(new URL('../../dist/platemark.cjs', import.meta.url))
const root = fileURLToPath(new URL('../..', import.meta.url))
const workshop = mkdtempSync(join(tmpdir(), 'platemark-'))
afterAll(() => rmSync(workshop, { recursive: true, force: true }))

let folder = ''
let count = 0
beforeEach(() => {
  folder = join(workshop, String(count++))
  mkdirSync(folder)
})

function run(...args: string[]) {
  const { status, stdout, stderr } = spawnSync(process.execPath, [command, ...args], { cwd: folder, encoding: 'utf8' })
  return { status, stdout, stderr }
}

const put = (name: string, text: string | Uint8Array) => writeFileSync(join(folder, name), text)
const read = (name: string) => readFileSync(join(folder, name), 'utf8')

const sound =
  '```areas\n| area | from | to | load |\n|---|---|---|---|\n| A | 0 ft, 0 ft | 9 ft, 9 ft | 50 psf |\n```\n\n```working\ncentre of mass\n```\n'
const faulty = sound.replace('50 psf', '50 pfs')

describe('exit codes', () => {
  test('0 when a document builds', () => {
    put('a.md', sound)
    expect(run('build', 'a.md').status).toBe(0)
  })

  test('1 when a document has an error', () => {
    put('a.md', faulty)
    expect(run('build', 'a.md').status).toBe(1)
    expect(run('check', 'a.md').status).toBe(1)
  })

  test.each([
    [[]],
    [['bild', 'a.md']],
    [['build']],
    [['build', 'a.md', '--too', 'html']],
    [['build', 'a.md', '--to', 'docx']],
    [['build', 'a.md', '--browser', 'chromium']],
  ])('2 when it is called wrongly: %j', args => {
    put('a.md', sound)
    const { status, stderr } = run(...args)
    expect(status).toBe(2)
    expect(stderr).toContain('platemark --help')
  })

  test('help and version go to standard output', () => {
    expect(run('--help')).toMatchObject({ status: 0, stderr: '' })
    expect(run('build', '--help').stdout).toContain('--draft')
    expect(run('check', '--help').stdout).toContain('writes nothing')
    expect(run('--version').stdout).toMatch(/^\d+\.\d+\.\d+\n$/)
  })
})

describe('signs beyond ASCII', () => {
  test('are read by the command as they are by the tests: raised digits, a centred dot, a double prime', () => {
    put('a.md', '```equations\nA = 12 ft² + 3 ft·ft -> ft^2\nL = 5″ -> in\n```\n')
    expect(run('build', 'a.md', '--to', 'json')).toMatchObject({ status: 0, stderr: '' })
    expect(JSON.parse(read('a.json')).values.A.printed).toBe('15 ft²')
  })

  test('stand in no file of the command, which is read as Latin-1', () => {
    const files = readdirSync(join(root, 'dist')).filter(name => name.endsWith('.cjs') && name !== 'platemark.cjs')
    expect(files).toContain('command.cjs')
    for (const name of files) expect(readFileSync(join(root, 'dist', name), 'utf8')).toMatch(/^[\0-\x7f]*$/)
  })
})

describe('before a document goes out', () => {
  test('check --submittal names what is missing, in the order of the source, and ends with 1', () => {
    put('a.md', `---\nunits: US\n---\n\n${sound}`)
    const { status, stderr } = run('check', 'a.md', '--submittal', '--list')
    expect(status).toBe(1)
    expect(stderr).toContain('a.md:2:1 error[submittal-missing] the front matter has no title\n')
    expect(stderr).toContain('nobody is named as the one who checked it')
    expect(run('check', 'a.md').status).toBe(0)
  })

  test('a failed check of the engineer’s own is a result, which check counts', () => {
    put('a.md', '```equations\na = 5 kip\na <= 4 kip   # Anchor bolts; house standard 7\n```\n')
    const { status, stdout } = run('check', 'a.md')
    expect(status).toBe(1)
    expect(stdout).toBe('a.md: Anchor bolts: 5 kip > 4 kip, ratio 1.25, NG\na.md: 1 check, 1 failed\n')
    expect(run('build', 'a.md').status).toBe(0)
  })
})

describe('what a build writes', () => {
  test('a page beside its source, and nothing else', () => {
    put('a.md', sound)
    run('build', 'a.md')
    expect(readdirSync(folder).sort()).toEqual(['a.html', 'a.md'])
  })

  test('the worked Markdown never takes the place of its source', () => {
    put('a.md', sound)
    run('build', 'a.md', '--to', 'md')
    expect(read('a.md')).toBe(sound)
    expect(read('a.worked.md')).toContain('x_m')
    run('build', 'a.md', '--to', 'md', '--out', '.')
    expect(read('a.md')).toBe(sound)
  })

  test('a document with errors leaves its pages as they were, and its results tell the errors', () => {
    put('a.md', sound)
    run('build', 'a.md', '--to', 'html,json')
    const before = read('a.html')
    put('a.md', faulty)
    run('build', 'a.md', '--to', 'html,json')
    expect(read('a.html')).toBe(before)
    expect(JSON.parse(read('a.json')).diagnostics[0]).toMatchObject({
      rule: 'unknown-unit',
      severity: 'error',
      line: 4,
    })
  })

  test('a draft is written with a box at the fault and a banner', () => {
    put('a.md', faulty)
    expect(run('build', 'a.md', '--draft').status).toBe(1)
    expect(read('a.html')).toContain('there is no unit pfs')
    expect(read('a.html')).toMatch(/draft/i)
  })

  test('the same source gives the same bytes', () => {
    put('a.md', sound)
    run('build', 'a.md', '--to', 'html,md,json', '--out', 'x')
    run('build', 'a.md', '--to', 'html,md,json', '--out', 'y')
    for (const name of ['a.html', 'a.md', 'a.json']) expect(read(`x/${name}`)).toBe(read(`y/${name}`))
  })

  test('several files and a folder in one call; one with errors does not stop the others', () => {
    mkdirSync(join(folder, 'calcs', 'deep'), { recursive: true })
    put('calcs/a.md', faulty)
    put('calcs/b.md', sound)
    put('calcs/deep/c.md', sound)
    put('d.md', sound)
    expect(run('build', 'calcs', 'd.md').status).toBe(1)
    expect(existsSync(join(folder, 'calcs/a.html'))).toBe(false)
    for (const name of ['calcs/b.html', 'calcs/deep/c.html', 'd.html'])
      expect(existsSync(join(folder, name))).toBe(true)
  })

  test('results keep to their published schema, for every sample', () => {
    const validate = new Ajv({ allErrors: true }).compile(schema)
    run('build', join(root, 'samples'), '--to', 'json', '--out', 'out')
    for (const name of readdirSync(join(folder, 'out'), { recursive: true, encoding: 'utf8' }).filter(name =>
      name.endsWith('.json'),
    )) {
      expect(
        validate(JSON.parse(read(`out/${name}`))),
        `${name}: ${JSON.stringify(validate.errors?.slice(0, 3))}`,
      ).toBe(true)
    }
  })
})

describe('a PDF that cannot be printed', () => {
  test('is said once, with what named the browser; the other formats are written', () => {
    put('a.md', sound)
    put('b.md', sound)
    const { status, stderr } = run('build', 'a.md', 'b.md', '--to', 'html,pdf', '--browser', './none')
    expect(status).toBe(1)
    expect(stderr.match(/--browser: there is no program \.\/none/g)).toHaveLength(1)
    expect(stderr).toContain('b.md: the PDF was not written')
    expect(readdirSync(folder).sort()).toEqual(['a.html', 'a.md', 'b.html', 'b.md'])
  })

  test('is named by the environment too', () => {
    put('a.md', sound)
    const { status, stderr } = spawnSync(process.execPath, [command, 'build', 'a.md', '--to', 'pdf'], {
      cwd: folder,
      encoding: 'utf8',
      env: { ...process.env, PLATEMARK_BROWSER: '/nowhere/chrome' },
    })
    expect(status).toBe(1)
    expect(stderr).toContain('PLATEMARK_BROWSER: there is no program /nowhere/chrome')
  })

  test('is not wanted of a document with errors, but as a draft', () => {
    put('a.md', faulty)
    expect(run('build', 'a.md', '--to', 'pdf', '--browser', './none').stderr).not.toContain('PDF')
    expect(run('build', 'a.md', '--to', 'pdf', '--draft', '--browser', './none').stderr).toContain(
      'the PDF was not written',
    )
  })
})

describe('audit', () => {
  test('finds every printed line of every sample to hold to its digits', () => {
    const { status, stdout } = run('audit', join(root, 'samples'))
    expect(status).toBe(0)
    expect(stdout).toMatch(/boatyard\.md: [3-9]\d\d lines audited, all hold/)
  })
})

describe('what cannot be read or written is said in plain words', () => {
  test('a file that is not there', () => {
    const { status, stderr } = run('build', 'none.md')
    expect(status).toBe(1)
    expect(stderr).toBe('none.md: there is no such file or folder\n')
  })

  test('a folder without Markdown', () => {
    mkdirSync(join(folder, 'empty'))
    expect(run('build', 'empty').stderr).toContain('no Markdown file')
  })

  test('bytes that are not UTF-8, at their line', () => {
    put('a.md', Buffer.from('---\ntitle: Caf\xe9\n---\n', 'latin1'))
    const { status, stderr } = run('check', 'a.md')
    expect(status).toBe(1)
    expect(stderr).toContain('a.md:2:11')
  })

  test('a file of 10 MB', () => {
    put('a.md', `${sound}${'x'.repeat(10 * 1024 * 1024)}`)
    expect(run('check', 'a.md').stderr).toContain('10 MB; 5 MB are read')
  })

  test('an output folder that cannot be made', () => {
    put('a.md', sound)
    put('taken', 'a file')
    const { status, stderr } = run('build', 'a.md', '--out', 'taken')
    expect(status).toBe(1)
    expect(stderr).toMatch(/taken: the results cannot be written/)
  })

  test('no message shows a stack or a path of the program', () => {
    put('a.md', faulty)
    expect(run('check', 'a.md').stderr).not.toMatch(/at .*\.(?:cjs|ts):\d+/)
  })
})

describe('trace', () => {
  test('tells a value, what it rests on, and the lines that they were written in', () => {
    put('a.md', sound)
    const { status, stdout } = run('trace', 'a.md', 'level.W')
    expect(status).toBe(0)
    expect(stdout).toMatch(/^level\.W: \S+ = [\d.]+ kip/)
    expect(stdout).toMatch(/\n +line \d+: \| A \|/)
  })

  test('offers near names for a misspelt id, and asks for one that is missing', () => {
    put('a.md', sound)
    const strange = run('trace', 'a.md', 'level.WW')
    expect(strange.status).toBe(1)
    expect(strange.stderr).toContain('Did you mean level.W')
    expect(run('trace', 'a.md').status).toBe(2)
  })
})

describe('hostile documents', () => {
  test('no script, handler, remote address or script link reaches a page', () => {
    put(
      'a.md',
      `${sound.replace('| A |', '| <script>alert(1)</script> |')}\n<script>alert(2)</script>\n\n[x](javascript:alert(3)) ![p](http://example.test/x.png) <b onclick="x()">hi</b> [y](data:text/html,z)\n`,
    )
    expect(run('build', 'a.md', '--to', 'html,md').status).toBe(0)
    const page = read('a.html')
    // The page's own two: its data, and the script that its policy names.
    expect(page.match(/<script/gi)).toHaveLength(2)
    expect(page.match(/<\/script/gi)).toHaveLength(2)
    expect(page).not.toMatch(/onclick=/i)
    expect(page).not.toMatch(/javascript:/i)
    expect(page).not.toMatch(/src="http/i)
    expect(page).not.toMatch(/href="data:/i)
    // An escaped < is a letter, not a tag.
    expect(read('a.worked.md')).not.toMatch(/(?<!\\)<script/i)
  })

  test('nesting, towers and long lines end in a message, not in a crash', () => {
    const deep = (n: number) => `${'('.repeat(n)}1${')'.repeat(n)}`
    put(
      'a.md',
      `\`\`\`equations\na = ${deep(20000)}\nb = ${deep(3000)}\nc = ${'2^'.repeat(2000)}2\nd = 9^9^9^9\n\`\`\`\n${'>'.repeat(3000)} x\n${'- '.repeat(500)}y\n`,
    )
    const { status, stderr } = run('check', 'a.md')
    expect(status).toBe(1)
    expect(stderr).toContain('expression-too-long')
    expect(stderr).toContain('expression-too-deep')
    expect(stderr).toContain('no-finite-value')
    expect(stderr).toContain('nested-too-deep')
  })

  test('5,000 walls are worked', () => {
    const walls = Array.from(
      { length: 5000 },
      (_, i) =>
        `| W${i} | ${i % 100} ft, ${Math.floor(i / 100)} ft | ${(i % 100) + (i % 2)} ft, ${Math.floor(i / 100) + 1 - (i % 2)} ft | 5 kip/in |`,
    )
    put(
      'a.md',
      `\`\`\`areas\n| area | from | to | load |\n|---|---|---|---|\n| A | 0 ft, 0 ft | 100 ft, 51 ft | 50 psf |\n\`\`\`\n\n\`\`\`walls\n| wall | from | to | k |\n|---|---|---|---|\n${walls.join('\n')}\n\`\`\`\n\n\`\`\`forces\nx: 50 kip\ny: 50 kip\naccidental: 5%\n\`\`\`\n\n\`\`\`working\ndesign shears\n\`\`\`\n`,
    )
    const { status, stdout } = run('build', 'a.md')
    expect(status).toBe(0)
    expect(stdout).toContain('OK')
  })
})
