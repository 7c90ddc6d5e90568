// Live input: the device, its permission, the browser's voice processing switched off, and its going away.
import type { AudioContext, IMediaStreamAudioSourceNode } from 'standardized-audio-context'
import { say } from '../shell/messages.ts'
import { type Device, useSession } from '../state/session.ts'
import { currentGraph } from './currentGraph.ts'
import { wrapper } from './wrapper.ts'

interface Opened {
  readonly stream: MediaStream
  node: IMediaStreamAudioSourceNode<AudioContext> | null
}

let opened: Opened | null = null

/** Asks for the device ('' is the system's choice). Returns its label, or null when refused, with a message said. */
export async function openInput(deviceId: string): Promise<{ readonly deviceId: string; readonly label: string } | null> {
  if (!navigator.mediaDevices?.getUserMedia) {
    say('refusal', 'Live input was not opened; what was open stays', ['this browser gives pages no input over this address'])
    return null
  }
  try {
    const stream = await navigator.mediaDevices.getUserMedia({
      audio: {
        ...(deviceId === '' ? {} : { deviceId: { exact: deviceId } }),
        echoCancellation: false,
        noiseSuppression: false,
        autoGainControl: false,
        channelCount: { ideal: 2 },
      },
    })
    closeInput()
    opened = { stream, node: null }
    const track = stream.getAudioTracks()[0]
    track?.addEventListener('ended', () => onEnded(stream))
    await listDevices()
    return { deviceId: track?.getSettings().deviceId ?? deviceId, label: track?.label || 'Live input' }
  } catch (error) {
    say('refusal', 'Live input was not opened; what was open stays', [reasonOf(error)])
    return null
  }
}

/** Connects the open device to the graph. False when the browser cannot join the device's rate with the context's. */
export function connectInput(): boolean {
  const graph = currentGraph()
  const parts = wrapper()
  if (!graph || !parts || !opened) return true
  opened.node?.disconnect()
  try {
    opened.node = new parts.MediaStreamAudioSourceNode(graph.context, { mediaStream: opened.stream })
    opened.node.connect(graph.node)
    return true
  } catch {
    opened.node = null
    return false
  }
}

/** Lets the device go: its tracks stop and the browser's recording mark disappears. */
export function closeInput(): void {
  if (!opened) return
  const { stream, node } = opened
  opened = null
  node?.disconnect()
  for (const track of stream.getTracks()) track.stop()
}

export const inputIsOpen = (): boolean => opened !== null

function onEnded(stream: MediaStream): void {
  if (opened?.stream !== stream) return
  const { source } = useSession.getState()
  // The gate in the processor fades; the node goes only after that.
  useSession.setState({ headphones: false })
  setTimeout(() => {
    if (opened?.stream === stream) closeInput()
  }, 200)
  if (source.kind === 'live')
    say('note', `“${source.label}” is gone`, ['It was unplugged or taken away; its sound was faded out. Choose a source to go on.'])
  void listDevices()
}

/** Names are only given after a permission. */
export async function listDevices(): Promise<void> {
  const all = (await navigator.mediaDevices?.enumerateDevices?.()) ?? []
  const named = (kind: MediaDeviceKind): readonly Device[] =>
    all.filter((device) => device.kind === kind && device.label !== '').map(({ deviceId, label }) => ({ deviceId, label }))
  useSession.setState({ devices: named('audioinput'), outputs: named('audiooutput') })
}

/** Keeps the list true while devices come and go; devices stay nameless until a permission. */
export function watchDevices(): void {
  navigator.mediaDevices?.addEventListener?.('devicechange', () => void listDevices())
}

function reasonOf(error: unknown): string {
  const name = error instanceof DOMException ? error.name : ''
  if (name === 'NotAllowedError') return 'the browser or the system did not allow it: allow the microphone for this page and try again'
  if (name === 'NotFoundError' || name === 'OverconstrainedError') return 'no such input device is there: plug it in and try again'
  if (name === 'NotReadableError') return 'the device is used by another program: close it there and try again'
  return error instanceof Error ? error.message : String(error)
}
