// A plot's picture and numbers as files of the user's.
import { download } from '../shell/fileAccess.ts'
import type { PlotNumbers } from './plotTypes.ts'

/** Comma-separated, one head line, points as decimal mark (RFC 4180); an empty field where there is no number. */
export function csvText({ head, columns }: PlotNumbers): string {
  const length = columns[0]?.length ?? 0
  const lines = [head.join(',')]
  for (let i = 0; i < length; i++) lines.push(columns.map((column) => csvNumber(column[i] as number)).join(','))
  return `${lines.join('\r\n')}\r\n`
}

function csvNumber(value: number): string {
  return Number.isFinite(value) ? String(Number(value.toPrecision(12))) : ''
}

/** "narrow-resonant-sweep-response.csv" */
export function plotFileName(setName: string, plot: string, ending: string): string {
  const plain = setName
    .toLowerCase()
    .replace(/[^\p{L}\p{N}]+/gu, '-')
    .replace(/^-+|-+$/g, '')
  return `${plain || 'set'}-${plot}.${ending}`
}

export async function savePicture(name: string, picture: HTMLCanvasElement): Promise<void> {
  const content = await new Promise<Blob | null>((done) => {
    picture.toBlob(done, 'image/png')
  })
  if (!content) throw new TypeError('this browser made no picture of the plot')
  download(name, content)
}
