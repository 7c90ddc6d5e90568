// Bad use and bad input: exit 2, `error:` then `hint:`, nothing on standard output, no file left, no stack.
import { mkdirSync, symlinkSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { writeWav } from '../../src/media/wav.ts'
import { compiledCommand, demoSet, typed, workFolder } from './typed.ts'

const { folder, files, clear } = workFolder()
let command: readonly string[]
const put = (name: string, content: string | Uint8Array) => writeFileSync(path.join(folder, name), content)
const set = (rest: object) => JSON.stringify({ format: 'combwright-set', version: 1, ...rest })
const good = demoSet('three-slow-voices')

beforeAll(async () => {
  command = await compiledCommand(folder)
  put('good.set.json', set({}))
  put('broken.set.json', '{ "format": "combwright-set",\n  "version": 1,\n  "name": }')
  put('empty.set.json', '')
  put('unknown.set.json', set({ sweep: { rate: 1 } }))
  put('type.set.json', set({ sweep: { rateHz: '1' } }))
  put('range.set.json', set({ loop: { feedback: 3 } }))
  put('future.set.json', set({ version: 7 }))
  put('close.set.json', set({ line: { baseMs: 1 } }))
  put('many.set.json', set(Object.fromEntries(Array.from({ length: 30 }, (_, i) => [`key${i}`, i]))))
  put('bytes.set.json', Uint8Array.from([0xff, 0xfe, 0, 1, 2, 3]))
  put('large.set.json', ' '.repeat(300000))
  put('still.set.json', set({ line: { baseMs: 1 }, sweep: { rateHz: 0, depthMs: 5 }, voices: { count: 1, spreadMs: 0 } }))
  put(
    'runaway.set.json',
    set({ loop: { feedback: 2, delay: 'fixed', interpolation: 'nearest' }, line: { baseMs: 4.5 }, sweep: { depthMs: 0 } }),
  )
  const wav = writeWav([new Float64Array(48000).map((_, i) => Math.sin(i / 10))], 48000, 'pcm16')
  put('tone.wav', wav)
  put('cut.wav', wav.slice(0, 1000))
  put('empty.wav', '')
  put('foreign.wav', 'This is a text about music, and no sound file at all, though its name says so.')
  put('slow.wav', writeWav([new Float64Array(10)], 500, 'pcm16'))
  mkdirSync(path.join(folder, 'folder'))
  symlinkSync('nowhere.wav', path.join(folder, 'astray.wav'))
  symlinkSync('circle.wav', path.join(folder, 'circle.wav'))
})
afterAll(clear)

const cases: readonly (readonly [what: string, words: readonly string[], error: RegExp, hint: RegExp])[] = [
  ['no command', [], /no command given/, /--help/],
  ['an unknown command', ['chek', good], /unknown command 'chek'/, /did you mean check\?/],
  ['help for an unknown command', ['help', 'chek'], /unknown command 'chek'/, /did you mean "check"\?/],
  ['an unknown option', ['check', good, '--jsn'], /unknown option '--jsn'/, /did you mean --json\?/],
  ['a missing argument', ['check'], /missing required argument 'set'/, /check --help/],
  ['too many arguments', ['check', good, good], /too many arguments for 'check'/, /check --help/],
  ['a missing option value', ['check', good, '--rate'], /'--rate <hz>' argument missing/, /check --help/],
  ['a missing file', ['check', 'nowhere.set.json'], /nowhere\.set\.json cannot be read: no such file/, /path of a set file/],
  ['a folder', ['sweep', 'folder'], /folder cannot be read: it is a folder/, /path of a set file/],
  ['a device', ['check', '/dev/zero'], /\/dev\/zero cannot be read: it is a device/, /path of a set file/],
  ['an empty path', ['check', ''], /the path of a set file is empty/, /path of a file/],
  ['a path through a file', ['check', 'tone.wav/x'], /cannot be read: a part of its path is no folder/, /path/],
  [
    'broken JSON',
    ['check', 'broken.set.json'],
    /broken\.set\.json: the text is not JSON: unexpected "}" at line 3, column 11/,
    /strict JSON/,
  ],
  ['an empty set file', ['check', 'empty.set.json'], /the text is empty/, /strict JSON/],
  ['an unknown key', ['check', 'unknown.set.json'], /sweep\.rate is an unknown key/, /did you mean "rateHz"\?/],
  ['a wrong type', ['response', 'type.set.json'], /sweep\.rateHz must be 0 to 100 Hz, got "1"/, /without quotes/],
  ['a value out of range', ['sweep', 'range.set.json'], /loop\.feedback must be -2 to 2, got 3/, /combwright new --help/],
  ['a future version', ['check', 'future.set.json'], /version 7 is newer than this reader, which knows 1/, /later one/],
  [
    'reads before the write point',
    ['check', 'close.set.json'],
    /line\.baseMs 1 ms lets a voice's lagrange3 read come to -168 samples/,
    /set line\.baseMs to 4\.521/,
  ],
  ['more problems than a screen holds', ['check', 'many.set.json'], /10 more problems/, /mend the first ones/],
  ['bytes that are no text', ['check', 'bytes.set.json'], /no UTF-8 text/, /JSON text/],
  ['a file larger than any set', ['check', 'large.set.json'], /300000 bytes, where a set has at most 262144/, /set file\?/],
  ['a WAV for a set', ['check', 'tone.wav'], /tone\.wav/, /./],
  ['a position past the end', ['response', good, '--position', '1.2'], /--position must be 0 to 1, got 1\.2/, /0 to 1/],
  ['a position that is none', ['response', good, '--position', 'middle'], /--position must be 0 to 1, got "middle"/, /./],
  [
    'a position where a still set reads too close',
    ['response', 'still.set.json', '--position', '0.75'],
    /would read closer/,
    /position the sweep reaches/,
  ],
  [
    'a frequency past half the rate',
    ['response', good, '--frequencies', '100,30k'],
    /--frequencies must be 0 to 24000 Hz, got 30k/,
    /48000 Hz/,
  ],
  ['an empty frequency', ['response', good, '--frequencies', '100,,200'], /--frequencies must be 0 to 24000 Hz/, /./],
  ['two ways to name frequencies', ['response', good, '--frequencies', '1', '--points', '3'], /both given/, /one of them/],
  ['no points', ['sweep', good, '--points', '0'], /--points must be a whole number from 1 to 100000, got 0/, /./],
  ['a rate no set has', ['check', good, '--rate', '1 MHz'], /--rate must be 8000 to 192000 Hz, got 1 MHz/, /./],
  [
    'an unknown status',
    ['check', good, '--fail-on', 'nearly'],
    /--fail-on must be one of fails, near, got "nearly"/,
    /did you mean "near"\?/,
  ],
  [
    'an unknown intent',
    ['new', '--intent', 'flnger', '--out', 'x.set.json'],
    /--intent must be one of chorus, flanger/,
    /did you mean "flanger"\?/,
  ],
  ['new without a file', ['new', '--intent', 'flanger'], /--out <set>/, /new --help/],
  ['new over a file', ['new', '--intent', 'flanger', '--out', 'good.set.json'], /good\.set\.json is already there/, /--force/],
  ['new into no folder', ['new', '--intent', 'flanger', '--out', 'no/x.set.json'], /there is no folder no/, /make the folder/],
  ['an empty WAV', ['render', good, 'empty.wav', 'out.wav'], /empty\.wav: the file is empty/, /WAV/],
  ['a cut WAV', ['render', good, 'cut.wav', 'out.wav'], /cut\.wav: the header promises 96000 bytes/, /copy it again/],
  ['a foreign file', ['render', good, 'foreign.wav', 'out.wav'], /foreign\.wav: not a WAV file/, /WAV/],
  ['a rate that cannot be resampled', ['render', good, 'slow.wav', 'out.wav'], /slow\.wav is at 500 Hz/, /export it at 48000 Hz/],
  ['a missing WAV', ['render', good, 'nowhere.wav', 'out.wav'], /nowhere\.wav cannot be read: no such file/, /WAV/],
  ['the output on the input', ['render', good, 'tone.wav', './folder/../tone.wav'], /the output .* is the input tone\.wav/, /another name/],
  [
    'the output on the set',
    ['render', 'good.set.json', 'tone.wav', 'good.set.json'],
    /the output good\.set\.json is the input good\.set\.json/,
    /another name/,
  ],
  [
    'an output folder that is missing',
    ['render', good, 'tone.wav', 'no/out.wav'],
    /no\/out\.wav cannot be written: there is no folder no/,
    /make the folder/,
  ],
  ['an output that is a folder', ['render', good, 'tone.wav', 'folder'], /folder cannot be written: it is a folder/, /path of a file/],
  [
    'an output that can only be a folder',
    ['render', good, 'tone.wav', 'new/'],
    /new\/ cannot be written: it is a folder/,
    /path of a file/,
  ],
  [
    'an output of too long a name',
    ['render', good, 'tone.wav', 'x'.repeat(300)],
    /cannot be written: its name is too long/,
    /another path/,
  ],
  ['a link to nothing for an output', ['render', good, 'tone.wav', 'astray.wav'], /link that leads nowhere/, /mend the link/],
  ['a circle of links for an output', ['new', '--intent', 'comb', '--out', 'circle.wav'], /its links go in a circle/, /another path/],
  ['a device for an output', ['render', good, 'tone.wav', '/dev/null'], /device or a pipe/, /path of a file/],
  [
    'a format whose twin is still to come',
    ['render', good, 'tone.wav', 'out.wav', '--format', 'q15'],
    /--format q15 has no twin yet/,
    /double/,
  ],
  [
    'an unknown format',
    ['render', good, 'tone.wav', 'out.wav', '--format', 'mp3'],
    /--format must be one of double, float32, q31, q15, got "mp3"/,
    /./,
  ],
  ['a negative tail', ['render', good, 'tone.wav', 'out.wav', '--tail', '-1'], /--tail must be 0 to 3600 s, or ring, got -1/, /./],
  [
    'a loop that runs away',
    ['render', 'runaway.set.json', 'tone.wav', 'out.wav', '--tail', '20'],
    /grows past what a float file holds/,
    /lower loop\.feedback/,
  ],
]

describe('refusals', () => {
  it.each(cases)('%s', async (_, words, error, hint) => {
    const before = files()
    const { code, stdout, stderr } = await typed(folder, words, { command })
    expect({ code, stdout }).toEqual({ code: 2, stdout: '' })
    const lines = stderr.trimEnd().split('\n')
    // error, hint, error, hint …: nothing else, no stack, no full stop.
    lines.forEach((line, i) => {
      expect(line).toMatch(i % 2 === 0 ? /^error: [^A-Z].*[^.]$/ : /^hint: .*[^.]$/)
    })
    expect(lines.length % 2).toBe(0)
    expect(stderr).toMatch(error)
    expect(stderr).toMatch(hint)
    expect(stderr).not.toMatch(/\n\s+at |node:|\.ts:\d/)
    expect(files()).toEqual(before)
  })
})
