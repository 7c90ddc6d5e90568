// The words of `npm start`. That it builds and serves is tried by every test of the page in a browser.
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, expect, it } from 'vitest'
import { typed, workFolder } from './typed.ts'

const { folder, clear } = workFolder()
const top = fileURLToPath(new URL('../../', import.meta.url))
const command = [path.join(top, 'node_modules', 'tsx', 'dist', 'cli.mjs'), path.join(top, 'src', 'cli', 'serve.ts')]
afterAll(clear)

it.each([
  ['--prt', /^error: unknown option '--prt'\nhint: 'npm start -- --help' shows how it is used\n$/],
  ['--port', /^error: option '--port <value>' argument missing\nhint: .*\n$/],
  ['--port=70000', /^error: --port must be a whole number from 1 to 65535, got 70000\nhint: leave it out for 4810\n$/],
])('npm start -- %s is refused with a hint and no stack', async (word, message) => {
  const { code, stdout, stderr } = await typed(folder, [word], { command })
  expect({ code, stdout }).toEqual({ code: 2, stdout: '' })
  expect(stderr).toMatch(message)
})

it('npm start -- --help says how it is used, on standard output', async () => {
  const { code, stdout, stderr } = await typed(folder, ['--help'], { command })
  expect({ code, stderr }).toEqual({ code: 0, stderr: '' })
  expect(stdout).toContain('--no-build')
})
