// Files dropped anywhere on the page: a recording becomes the source, a set file is opened. One handler, so that a file dropped beside a
// control never makes the browser leave the page.
import { openAudioFile } from '../audio/audition.ts'
import { say } from './messages.ts'
import { openSetFile } from './setFiles.ts'

export type DropKind = 'set' | 'audio' | 'unknown'

const AUDIO_NAMES = /\.(wav|wave|bwf|rf64|flac|mp3|m4a|mp4|aac|ogg|oga|opus|webm|aif|aiff|caf)$/i

/** What a file is taken for, by its type and name; what it really is shows when it is read. */
export function dropKind({ name, type }: { readonly name: string; readonly type: string }): DropKind {
  if (/\.json$/i.test(name) || type === 'application/json') return 'set'
  if (type.startsWith('audio/') || type === 'video/mp4' || type === 'video/webm' || AUDIO_NAMES.test(name)) return 'audio'
  return 'unknown'
}

/** Takes dropped files: the first recording and the first set. */
export async function takeDropped(files: readonly File[]): Promise<void> {
  const first = (kind: DropKind) => files.find((file) => dropKind(file) === kind)
  const set = first('set')
  const audio = first('audio')
  if (set) await openSetFile(set)
  if (audio) await openAudioFile(audio)
  if (set || audio) return
  const [unknown] = files
  if (unknown)
    say('refusal', `“${unknown.name}” was not opened; what was open stays`, ['drop a recording (WAV at best) or a set file (*.set.json)'])
  else say('refusal', 'Nothing was opened', ['drop a file: a recording (WAV at best) or a set file (*.set.json)'])
}

const carriesFiles = (event: DragEvent) => event.dataTransfer?.types.includes('Files') === true

/** Listens on the window; while files hang over the page, <html> carries data-dropping. Returns the way to stop. */
export function watchDrops(): () => void {
  const root = document.documentElement
  let depth = 0
  const mark = () => root.toggleAttribute('data-dropping', depth > 0)
  const onEnter = (event: DragEvent) => {
    if (!carriesFiles(event)) return
    depth += 1
    mark()
  }
  const onLeave = (event: DragEvent) => {
    if (!carriesFiles(event)) return
    depth = Math.max(0, depth - 1)
    mark()
  }
  const onOver = (event: DragEvent) => {
    if (!carriesFiles(event)) return
    event.preventDefault()
    if (event.dataTransfer) event.dataTransfer.dropEffect = 'copy'
  }
  const onDrop = (event: DragEvent) => {
    if (!carriesFiles(event)) return
    event.preventDefault()
    depth = 0
    mark()
    // A dropped folder comes as a file without content or type; its entry says what it is.
    const items = [...(event.dataTransfer?.items ?? [])]
    const hasFolder = items.some((item) => item.webkitGetAsEntry?.()?.isDirectory)
    void takeDropped(hasFolder ? [] : [...(event.dataTransfer?.files ?? [])])
  }
  addEventListener('dragenter', onEnter)
  addEventListener('dragleave', onLeave)
  addEventListener('dragover', onOver)
  addEventListener('drop', onDrop)
  return () => {
    removeEventListener('dragenter', onEnter)
    removeEventListener('dragleave', onLeave)
    removeEventListener('dragover', onOver)
    removeEventListener('drop', onDrop)
    root.removeAttribute('data-dropping')
  }
}
