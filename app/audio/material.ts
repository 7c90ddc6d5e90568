// Recorded material: which sound is loaded, at which rate, and handing it to the processor.
import { say } from '../shell/messages.ts'
import { loadOrSay } from '../shell/usePopup.ts'
import { currentSet } from '../state/current.ts'
import { type Source, useSession } from '../state/session.ts'
import { askMaterial } from '../workers/materialClient.ts'
import type { Material, MaterialReply } from '../workers/materialProtocol.ts'
import type { Decoded } from './browserDecode.ts'
import { currentGraph } from './currentGraph.ts'
import { post } from './graph.ts'
import type { SourceMessage } from './worklet/messages.ts'

/** What the sound is made from, kept to make it again at another rate. */
type Recipe = { readonly kind: 'phrase'; readonly id: string } | { readonly kind: 'file'; readonly file: File }

interface Loaded {
  readonly recipe: Recipe
  readonly memory: number
  readonly rate: number
  readonly seconds: number
}

let loaded: Loaded | null = null
let request = 0

/** Number and length of the sound that is loaded, for measuring it. */
export const loadedMaterial = (): Loaded | null => loaded

const wantedRate = () => currentGraph()?.rate ?? currentSet().sampleRate

/** Makes a phrase ready. False when something newer was chosen meanwhile, or it failed. */
export async function loadPhrase(id: string): Promise<boolean> {
  const made = await load({ kind: 'phrase', id }, null)
  if (made === null) return false
  adopt({ kind: 'phrase', id }, made)
  return true
}

/** Reads the user's recording; a refusal is said and what was open stays. */
export async function loadFile(file: File): Promise<boolean> {
  useSession.setState({ loading: `Reading ${file.name} …` })
  const made = await load({ kind: 'file', file }, file.name)
  if (made === null) return false
  adopt({ kind: 'file', file }, made)
  return true
}

/** Makes the sound of the session's source again for the graph's rate: a new graph has none. */
export async function reloadMaterial(): Promise<void> {
  const { source } = useSession.getState()
  if (source.kind === 'live') return sendSource({ type: 'input' })
  if (source.kind === 'phrase' && source.id === TONE_ID) return sendSource({ type: 'tone' })
  const recipe: Recipe = source.kind === 'file' && loaded?.recipe.kind === 'file' ? loaded.recipe : { kind: 'phrase', id: phraseId(source) }
  const made = await load(recipe, recipe.kind === 'file' ? recipe.file.name : null)
  if (made !== null) adopt(recipe, made)
}

export const TONE_ID = 'tone'
const phraseId = (source: Source) => (source.kind === 'phrase' ? source.id : 'pluckedChords')

/** The waveform before the first sound, so that a region can be chosen in silence. */
export async function ensureMaterial(): Promise<void> {
  const { source, overview, loading } = useSession.getState()
  if (source.kind === 'phrase' && source.id !== TONE_ID && overview === null && loading === null) await reloadMaterial()
}

/** Sends tone, input or nothing and forgets recorded material. */
export function leaveMaterial(source: Extract<SourceMessage, { type: 'tone' | 'input' | 'nothing' }>): void {
  request += 1
  loaded = null
  useSession.setState({ overview: null, loading: null, repeat: null, equalDb: null })
  sendSource(source)
}

export function sendSource(source: SourceMessage, transfer: readonly Transferable[] = []): void {
  const graph = currentGraph()
  if (graph) post(graph, { type: 'source', source }, transfer)
}

/** Tells the processor of the session's repeat region. */
export function sendRegion(): void {
  const graph = currentGraph()
  if (!graph || !loaded) return
  const { start, end } = regionFrames(loaded)
  post(graph, { type: 'region', id: loaded.memory, start, end })
}

function regionFrames({ seconds, rate }: Loaded): { readonly start: number; readonly end: number } {
  const { repeat } = useSession.getState()
  const { startS, endS } = repeat ?? { startS: 0, endS: seconds }
  return { start: Math.round(startS * rate), end: Math.round(endS * rate) }
}

/** The material, or null when something newer was asked for or it was refused. */
async function load(recipe: Recipe, name: string | null): Promise<Material | null> {
  const mine = ++request
  const rate = wantedRate()
  const reply =
    recipe.kind === 'phrase' ? await askMaterial({ kind: 'phrase', phrase: recipe.id, rate }) : await readFile(recipe.file, rate)
  if (mine !== request) return null
  // The rate changed while it was made (a context that had to take the device's).
  if (wantedRate() !== rate) return load(recipe, name)
  if (reply.ok && 'material' in reply) return reply.material
  useSession.setState({ loading: null })
  if (!reply.ok)
    say('refusal', `${name === null ? 'The phrase' : `“${name}”`} was not opened; what was open stays`, [`${reply.reason}: ${reply.hint}`])
  return null
}

async function readFile(file: File, rate: number): Promise<MaterialReply> {
  const isWav = await startsAsWav(file)
  if (isWav) {
    const reply = await askMaterial({ kind: 'wav', file, rate })
    // A WAV around another coding (ADPCM, a-law) may still be something the browser decodes.
    if (reply.ok || reply.code !== 'unsupported') return reply
    const decoded = await decodeInBrowser(file, rate)
    return decoded.ok ? byBrowser(decoded.channels, rate) : reply
  }
  const decoded = await decodeInBrowser(file, rate)
  return decoded.ok ? byBrowser(decoded.channels, rate) : { ok: false, code: 'foreign', reason: decoded.reason, hint: decoded.hint }
}

/** Its code comes with the first file that needs it. */
async function decodeInBrowser(file: File, rate: number): Promise<Decoded> {
  const part = await loadOrSay(() => import('./browserDecode.ts'))
  return part ? part.decodeInBrowser(file, rate) : { ok: false, reason: 'a part of the page could not be fetched', hint: 'try again' }
}

async function byBrowser(channels: readonly Float32Array[], rate: number): Promise<MaterialReply> {
  const reply = await askMaterial({ kind: 'decoded', channels, rate })
  if (!reply.ok || !('material' in reply)) return reply
  return { ok: true, material: { ...reply.material, remarks: ['decoded by the browser', ...reply.material.remarks] } }
}

async function startsAsWav(file: File): Promise<boolean> {
  const head = new Uint8Array(await file.slice(0, 4).arrayBuffer())
  const name = String.fromCharCode(...head)
  return name === 'RIFF' || name === 'RF64' || name === 'BW64' || name === 'RIFX' || /\.(wav|wave)$/i.test(file.name)
}

/** What is loaded now is what sounds and shows. */
function adopt(recipe: Recipe, material: Material): void {
  const { source, repeat } = useSession.getState()
  const { seconds } = material.overview
  const sameSound = loaded !== null && isSame(loaded.recipe, recipe)
  const restored = loaded === null && recipe.kind === 'phrase' && source.kind === 'phrase' && source.id === recipe.id
  loaded = { recipe, memory: material.memory, rate: material.rate, seconds }
  const keepsRegion = (sameSound || restored) && repeat !== null && repeat.endS <= seconds + 1e-6 && repeat.startS < repeat.endS
  useSession.setState({
    source: recipe.kind === 'phrase' ? { kind: 'phrase', id: recipe.id } : fileSource(recipe.file, material),
    loading: null,
    overview: material.overview,
    repeat: keepsRegion ? repeat : null,
    equalDb: null,
  })
  const { start, end } = regionFrames(loaded)
  const own = material.channels.map((samples) => samples.buffer).filter((buffer): buffer is ArrayBuffer => buffer instanceof ArrayBuffer)
  sendSource({ type: 'sample', id: material.memory, channels: material.channels, circular: recipe.kind === 'phrase', start, end }, own)
}

function isSame(a: Recipe, b: Recipe): boolean {
  return a.kind === 'phrase' ? b.kind === 'phrase' && a.id === b.id : b.kind === 'file' && a.file === b.file
}

function fileSource(file: File, material: Material): Source {
  const isBrowsers = material.remarks[0] === 'decoded by the browser'
  return {
    kind: 'file',
    name: file.name,
    seconds: material.overview.seconds,
    channels: material.sourceChannels,
    rate: material.sourceRate,
    remark: (isBrowsers ? material.remarks : ['read as WAV', ...material.remarks]).join(', '),
  }
}
