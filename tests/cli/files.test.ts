import { readdirSync, readFileSync, symlinkSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { afterAll, describe, expect, it } from 'vitest'
import { CommandFailure } from '../../src/cli/failure.ts'
import { checkOutput, resolvePath, writeWhole } from '../../src/cli/files.ts'
import { workFolder } from './typed.ts'

const { folder, files, clear } = workFolder()
const at = (name: string) => path.join(folder, name)
const never = new AbortController().signal
afterAll(clear)

describe('writing whole or not at all', () => {
  it('leaves the file and nothing else', async () => {
    await writeWhole(at('a.txt'), 'text', never)
    expect(files()).toEqual(['a.txt'])
    expect(readFileSync(at('a.txt'), 'utf8')).toBe('text')
  })

  it('stopped half-way, leaves what was there before and clears away its own', async () => {
    writeFileSync(at('b.bin'), 'before')
    const controller = new AbortController()
    const writing = writeWhole(at('b.bin'), new Uint8Array(2 ** 26), controller.signal)
    // Once its folder is there, the write has begun.
    while (!readdirSync(folder).some((name) => name.startsWith('.'))) await new Promise((resolve) => setImmediate(resolve))
    controller.abort()
    await expect(writing).rejects.toThrow()
    expect(readFileSync(at('b.bin'), 'utf8')).toBe('before')
    expect(files().filter((name) => name.startsWith('.'))).toEqual([])
  })

  it('writes through a link to the file it leads to', async () => {
    writeFileSync(at('target.txt'), 'old')
    symlinkSync(at('target.txt'), at('link.txt'))
    await writeWhole(at('link.txt'), 'new', never)
    expect(readFileSync(at('target.txt'), 'utf8')).toBe('new')
  })

  it('says why it cannot', async () => {
    await expect(writeWhole(at('none/x'), 'text', never)).rejects.toThrow(CommandFailure)
  })
})

describe('outputs that are refused before any work', () => {
  it('an input under another name, links included', () => {
    writeFileSync(at('in.wav'), '')
    symlinkSync(at('in.wav'), at('same.wav'))
    expect(() => checkOutput(at('same.wav'), { inputs: [at('in.wav')] })).toThrow('is the input')
    expect(() => checkOutput(`${folder}/./in.wav`, { inputs: [at('in.wav')] })).toThrow('is the input')
    expect(() => checkOutput(at('other.wav'), { inputs: [at('in.wav')] })).not.toThrow()
  })
})

describe('paths', () => {
  it('are taken from where the process stands, unless npm moved it', () => {
    expect(resolvePath('x')).toBe(path.join(process.cwd(), 'x'))
    expect(resolvePath('/x')).toBe('/x')
  })
})
