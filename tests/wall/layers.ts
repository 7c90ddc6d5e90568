// Which folder may import which: the one table of the one direction (design 10). A folder may import itself; everything
// else stands here. Entries are folders, or single files where a whole folder would open too much.

export interface Layer {
  /** Folder, or one file; a file belongs to the longest entry it lies in. */
  readonly folder: string
  readonly may: readonly string[]
  /** Only as types, which are gone at run time. */
  readonly types?: readonly string[]
  /** Packages, with everything under them. */
  readonly packages?: readonly string[]
  /** May use Node's own modules. */
  readonly node?: true
  /** May consist of nothing but re-exports. */
  readonly barrel?: true
}

const BELOW_CHECKS = ['src/set', 'src/signal', 'src/material', 'src/dsp', 'src/analysis', 'src/firmware']
const PURE = [...BELOW_CHECKS, 'src/media', 'src/checks', 'src/handover', 'src/capture']
const CLIENTS = [
  'app/workers/analysisClient.ts',
  'app/workers/analysisProtocol.ts',
  'app/workers/curveClient.ts',
  'app/workers/materialClient.ts',
  'app/workers/materialProtocol.ts',
]
const VIEW = ['react', '@base-ui/react', 'zustand']
// What the shell offers to everyone: each a layer of its own, so that none of them can lead back to areas or sound.
const SERVICES = [
  'app/shell/messages.ts',
  'app/shell/announce.ts',
  'app/shell/fileAccess.ts',
  'app/shell/layout.ts',
  'app/shell/usePopup.ts',
  'app/shell/fetched.tsx',
]
const AREA = [...SERVICES, 'app/plots', 'app/fields', 'app/midi', 'app/audio', 'app/state', 'app/styles', ...CLIENTS, ...PURE]

export const LAYERS: readonly Layer[] = [
  { folder: 'src/set', may: [], packages: ['zod', '@humanwhocodes/momoa', 'fflate'] },
  { folder: 'src/signal', may: [], packages: ['fft.js'] },
  { folder: 'src/media', may: [], packages: ['fflate'] },
  { folder: 'src/material', may: ['src/signal'] },
  { folder: 'src/dsp', may: ['src/set', 'src/signal'] },
  { folder: 'src/analysis', may: ['src/set', 'src/signal', 'src/material', 'src/dsp'] },
  { folder: 'src/firmware', may: ['src/set', 'src/signal', 'src/dsp'] },
  { folder: 'src/checks', may: BELOW_CHECKS },
  { folder: 'src/handover', may: [...BELOW_CHECKS, 'src/checks', 'src/media'] },
  { folder: 'src/capture', may: ['src/set', 'src/signal', 'src/material', 'src/dsp', 'src/analysis', 'src/firmware'] },
  { folder: 'src/index.ts', may: PURE, barrel: true },
  // The command line prints the package's own version and serves the page with the page's own policy.
  {
    folder: 'src/cli',
    may: [...PURE, 'package.json', 'app/contentPolicy.ts'],
    packages: ['commander', 'cli-progress', 'vite'],
    node: true,
  },

  // State holds what every part of the page shares; it asks the workers and knows what the processor reports, by its messages only.
  {
    folder: 'app/state',
    may: [...PURE, ...CLIENTS, 'app/audio/worklet/messages.ts'],
    types: ['app/workers'],
    packages: ['zustand', 'zundo', 'idb-keyval'],
  },
  // Column arithmetic is plain numbers and the same on both sides, so that a worker computes what a plot draws.
  { folder: 'app/workers', may: [...PURE, 'app/plots/columns.ts'], types: ['app/state'] },
  {
    folder: 'app/plots',
    may: ['app/state', 'app/styles', 'app/shell/fileAccess.ts', ...CLIENTS, 'app/workers/analysisJobs/powerDb.ts', ...PURE],
    types: ['app/workers'],
    packages: ['uplot', ...VIEW],
  },
  { folder: 'app/fields', may: ['app/state', 'app/styles', 'app/shell/usePopup.ts', ...PURE], packages: VIEW },
  { folder: 'app/midi', may: ['app/state', 'app/fields', ...PURE], packages: VIEW },
  {
    folder: 'app/audio',
    may: ['app/audio/worklet', 'app/state', ...SERVICES, ...CLIENTS, ...PURE],
    packages: ['standardized-audio-context', 'idb-keyval'],
  },
  // The audio thread: no page, no package, nothing that allocates by surprise.
  {
    folder: 'app/audio/worklet',
    may: ['src/set', 'src/signal', 'src/dsp', 'src/firmware', 'src/material/tone.ts', 'app/audio/buildId.ts'],
    types: ['app/state/session.ts'],
  },
  { folder: 'app/areas/shape', may: AREA, types: ['app/workers'], packages: VIEW },
  { folder: 'app/areas/ship', may: AREA, packages: VIEW },
  { folder: 'app/areas/bench', may: AREA, packages: VIEW },
  ...SERVICES.map((folder) => ({ folder, may: ['app/state', ...SERVICES], packages: VIEW })),
  {
    folder: 'app/shell',
    may: ['app/areas/shape', 'app/areas/ship', 'app/areas/bench', ...AREA],
    packages: [...VIEW, 'virtual:pwa-register'],
  },
  { folder: 'app/styles', may: [] },
  { folder: 'app/contentPolicy.ts', may: [] },
  {
    // Where the page begins: it wires sound, state and shell together, so that they need not know each other.
    folder: 'app/main.tsx',
    may: ['app/shell', 'app/audio', 'app/state', 'app/styles', ...SERVICES],
    packages: ['react', 'react-dom', '@base-ui/react'],
  },
]

/** What may be reached at run time, over any number of imports, from where a thread begins. */
export interface Closure {
  readonly entry: RegExp
  readonly within: readonly string[]
  readonly packages: readonly string[]
}

export const CLOSURES: readonly Closure[] = [
  {
    entry: /^app\/audio\/worklet\/processor\.ts$/,
    within: ['app/audio/worklet', 'app/audio/buildId.ts', 'src/set', 'src/signal', 'src/dsp', 'src/firmware', 'src/material/tone.ts'],
    packages: [],
  },
  {
    entry: /^app\/workers\/[^/]+\.worker\.ts$/,
    within: ['app/workers', 'app/plots/columns.ts', ...PURE],
    packages: ['zod', '@humanwhocodes/momoa', 'fflate', 'fft.js'],
  },
]
