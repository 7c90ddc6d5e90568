// The sets that come with the workbench; their files stand in public/sets, each named for its id.

export interface DemoSet {
  readonly id: string
  readonly name: string
  /** Path below public/. */
  readonly file: string
  /** One sentence: what it is for. */
  readonly about: string
}

const demo = (id: string, name: string, about: string): DemoSet => ({ id, name, file: `sets/${id}.set.json`, about })

export const DEMO_SETS: readonly DemoSet[] = [
  demo('three-slow-voices', 'Three slow voices', 'Chorus on the four-knob unit: three voices a third of a cycle apart, slow and wide.'),
  demo(
    'narrow-resonant-sweep',
    'Narrow resonant sweep',
    'Flanger on the four-knob unit: a short narrow sweep, feedback near the edge, damped.',
  ),
  demo('struck-tube', 'Struck tube', 'Resonant comb on the two-knob unit: a standing delay tuned to a note, ringing like a struck tube.'),
  demo('two-takes', 'Two takes', 'Doubler on the six-knob unit: two drifting voices, one a side, like a part played twice.'),
  demo('gentle-waver', 'Gentle waver', 'Vibrato on the two-knob unit: no dry sound, a few cents of waver at five cycles a second.'),
  demo(
    'through-the-null',
    'Through the null',
    'Flanger on the six-knob unit: the wet sound passes a delayed dry one, through the moment of no delay.',
  ),
]
