/** The remark plugin in a pipeline that is not ours. */
import remarkFrontmatter from 'remark-frontmatter'
import remarkGfm from 'remark-gfm'
import remarkParse from 'remark-parse'
import remarkStringify from 'remark-stringify'
import { unified } from 'unified'
import { expect, test } from 'vitest'
import { remarkPlatemark } from '../../src/index.ts'

const source = `---
units: US
---

Before {{level.W}} after.

\`\`\`areas
| area | from       | to         | load   |
|------|------------|------------|--------|
| Room | 0 ft, 0 ft | 9 ft, 9 ft | 50 psf |
\`\`\`

\`\`\`js
left.alone()
\`\`\`

\`\`\`working
centre of mass
\`\`\`

{{level.none}}
`

const pipeline = unified()
  .use(remarkParse)
  .use(remarkGfm)
  .use(remarkFrontmatter)
  .use(remarkPlatemark)
  .use(remarkStringify)

test('puts results into the prose and the working into its place, and leaves other fences alone', async () => {
  const out = String(await pipeline.process({ value: source, path: 'room.md' }))
  expect(out).toContain('4.05 kip')
  expect(out).toMatch(/\$\$\n\\begin\{aligned\}\nx_m/)
  expect(out).toContain('left.alone()')
  expect(out).not.toContain('```areas')
})

test('tells each diagnostic as a message with its place and rule', async () => {
  const file = await pipeline.process({ value: source, path: 'room.md' })
  expect(
    file.messages.map(({ ruleId, source, line, column, fatal }) => ({ ruleId, source, line, column, fatal })),
  ).toEqual([{ ruleId: 'unknown-name', source: 'platemark', line: 21, column: 3, fatal: true }])
})
