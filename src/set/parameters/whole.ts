// What a set says about itself: name, notes, intent, rate, layout.
import type { Parameter } from './kinds.ts'
import { options } from './options.ts'

export const WHOLE_PARAMETERS: readonly Parameter[] = [
  {
    kind: 'text',
    path: 'name',
    label: 'Name',
    help: 'What the set is called on the page and in reports.',
    cName: 'name',
    maxLength: 120,
    default: 'Three slow voices',
  },
  {
    kind: 'text',
    path: 'notes',
    label: 'Notes',
    help: 'Anything worth keeping with the set.',
    cName: 'notes',
    maxLength: 20000,
    default: '',
  },
  {
    kind: 'choice',
    path: 'intent',
    label: 'Intent',
    cName: 'intent',
    default: 'chorus',
    help: 'Chooses which usual ranges are noted; it changes no sample.',
    options: options(
      ['chorus', 'chorus'],
      ['flanger', 'flanger'],
      ['vibrato', 'vibrato'],
      ['doubler', 'doubler'],
      ['comb', 'comb'],
      ['other', 'other'],
    ),
  },
  {
    kind: 'number',
    path: 'sampleRate',
    label: 'Sample rate',
    help: 'Rate the unit runs at; every time and frequency is realised at it.',
    cName: 'sample_rate',
    unit: 'Hz',
    min: 8000,
    max: 192000,
    default: 48000,
    taper: 'log',
  },
  {
    kind: 'choice',
    path: 'layout',
    label: 'Layout',
    cName: 'layout',
    default: 'stereo',
    help: 'How many lines and outputs: mono 1 and 1, stereo 2 and 2, mono to stereo 1 and 2.',
    options: options(['mono', 'mono'], ['stereo', 'stereo'], ['monoToStereo', 'mono to stereo']),
  },
]
