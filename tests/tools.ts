// Tools from outside the project that the tests lean on: where they are, and how they get there on Debian.
import { spawnSync } from 'node:child_process'
import { existsSync } from 'node:fs'
import { chromium } from '@playwright/test'

/** Debian's Chromium, else the one Playwright installed, else undefined. */
export function findChromium(): string | undefined {
  const candidates = ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome', chromium.executablePath()]
  return candidates.find((file) => file && existsSync(file))
}

/** A Python with numpy and scipy: Debian's own, not one a version manager put before it. */
export const PYTHON = '/usr/bin/python3'

export function hasScipy(): boolean {
  return spawnSync(PYTHON, ['-c', 'import numpy, scipy.signal'], { stdio: 'ignore' }).status === 0
}

export function hasCommand(name: string): boolean {
  return spawnSync(name, ['--version'], { stdio: 'ignore' }).status === 0
}

interface Tool {
  readonly name: string
  readonly what: string
  readonly packages: readonly string[]
  readonly otherwise: string
  present(): boolean
}

export const TOOLS: readonly Tool[] = [
  {
    name: 'Chromium',
    what: 'the page in a real browser',
    packages: ['chromium'],
    otherwise: 'npx playwright install chromium',
    present: () => findChromium() !== undefined,
  },
  {
    name: 'Python with numpy and scipy',
    what: 'outside references',
    packages: ['python3-numpy', 'python3-scipy'],
    otherwise: 'install python3 with numpy and scipy as /usr/bin/python3',
    present: hasScipy,
  },
  {
    name: 'sox',
    what: 'WAV files written by somebody else',
    packages: ['sox'],
    otherwise: 'install sox',
    present: () => hasCommand('sox'),
  },
  {
    name: 'gcc',
    what: 'the C kernels of the benchmark',
    packages: ['gcc', 'libc6-dev'],
    otherwise: 'install gcc',
    present: () => hasCommand('gcc'),
  },
]
