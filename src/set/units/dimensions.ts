// Which units may be typed where a quantity is wanted, and what each is worth.

/** value = number · 10^shift · factor, or `convert` where it is no multiple. */
export interface UnitWorth {
  readonly shift?: number
  readonly factor?: number
  readonly convert?: (value: number) => number
}

export interface Dimension {
  /** "a time in ms": what a refusal says is wanted. */
  readonly wanted: string
  /** "a time": what a refusal says was typed instead. */
  readonly kind: string
  readonly units: Readonly<Record<string, UnitWorth>>
  /** Units that would be guesswork, with what to write instead. */
  readonly unclear?: Readonly<Record<string, string>>
}

const TEN: UnitWorth = {}
const power = (shift: number): UnitWorth => ({ shift })
const times = (factor: number): UnitWorth => ({ factor })
const names = (worth: UnitWorth, ...spellings: readonly string[]): Record<string, UnitWorth> =>
  Object.fromEntries(spellings.map((spelling) => [spelling, worth]))

const frequency: Dimension = {
  wanted: 'a frequency in Hz',
  kind: 'a frequency',
  units: {
    ...names(TEN, 'Hz', 'hz', 'HZ'),
    ...names(power(3), 'kHz', 'khz', 'KHz', 'KHZ', 'k', 'K'),
    ...names(power(6), 'MHz', 'M'),
    ...names(power(-3), 'mHz'),
    ...names(times(1 / 60), 'bpm', 'BPM', '/min'),
  },
  unclear: { mhz: 'write MHz for millions, mHz for thousandths', MHZ: 'write MHz for millions, mHz for thousandths' },
}

/** Times in ms, or in s when `shift` is −3. */
const time = (unit: string, shift: number): Dimension => ({
  wanted: `a time in ${unit}`,
  kind: 'a time',
  units: {
    ...names(power(3 + shift), 's', 'sec', 'S'),
    ...names(power(shift), 'ms', 'msec', 'MS', 'Ms'),
    // Two code points look alike: the micro sign and the Greek letter.
    ...names(power(-3 + shift), 'us', 'µs', 'μs', 'usec'),
    ...names(power(-6 + shift), 'ns'),
  },
})

const angle: Dimension = {
  wanted: 'an angle in degrees',
  kind: 'an angle',
  units: { ...names(TEN, '°', 'deg', 'degree', 'degrees'), ...names(times(180 / Math.PI), 'rad') },
}

/** Musical intervals, `perOctave` of the wanted unit to an octave. */
const interval = (unit: string, perOctave: number): Dimension => ({
  wanted: `an interval in ${unit}`,
  kind: 'an interval',
  units: {
    ...names(times(perOctave), 'oct', 'octave', 'octaves'),
    ...names({ convert: (value) => (value * perOctave) / 12 }, 'st', 'semitone', 'semitones'),
    ...names({ convert: (value) => (value * perOctave) / 1200 }, 'ct', 'cent', 'cents'),
  },
})

const bytes: Dimension = {
  wanted: 'a size in bytes',
  kind: 'a size',
  units: {
    ...names(TEN, 'B', 'byte', 'bytes'),
    ...names(power(3), 'kB'),
    ...names(power(6), 'MB'),
    ...names(times(1024), 'KiB', 'kiB'),
    ...names(times(1048576), 'MiB'),
  },
  unclear: Object.fromEntries(
    ['k', 'K', 'KB', 'kb', 'Kb', 'M', 'Mb', 'mb'].map((u) => [u, 'write KiB or MiB for powers of 1024, kB or MB for powers of 1000']),
  ),
}

const count = (unit: string): Dimension => ({
  wanted: `a number of ${unit}`,
  kind: `a number of ${unit}`,
  units: { ...names(TEN, unit, unit.replace(/s$/, '')), ...names(power(3), 'k') },
})

const level: Dimension = { wanted: 'a level in dB', kind: 'a level', units: names(TEN, 'dB', 'db', 'DB') }

const bare: Dimension = {
  wanted: 'a plain number',
  kind: 'a plain number',
  units: {
    ...names(power(-2), '%'),
    ...names(power(3), 'k'),
    ...names({ convert: (value) => 10 ** (value / 20) }, 'dB', 'db', 'DB'),
  },
}

const BY_UNIT: Readonly<Record<string, Dimension>> = {
  ms: time('ms', 0),
  s: time('s', -3),
  Hz: frequency,
  dB: level,
  '°': angle,
  octaves: interval('octaves', 1),
  cents: interval('cents', 1200),
  B: bytes,
  samples: count('samples'),
  frames: count('frames'),
  '': bare,
}

/** What may be typed for a quantity in this unit. Throws RangeError for a unit no parameter has. */
export function dimensionOf(unit: string): Dimension {
  const found = Object.hasOwn(BY_UNIT, unit) ? BY_UNIT[unit] : undefined
  if (!found) throw new RangeError(`no quantity has the unit ${unit}; units are ${Object.keys(BY_UNIT).join(', ')}`)
  return found
}

/** What kind of thing a unit that does not belong measures ("a frequency"), or undefined for an unknown word. */
export function kindOfUnit(word: string): string | undefined {
  return Object.values(BY_UNIT).find((dimension) => dimension !== bare && Object.hasOwn(dimension.units, word))?.kind
}
