// A plot's picture and numbers as files of the user's.
import type { PlotNumbers } from './plotTypes.ts'

/** Hands a file to the browser's downloads. */
export function saveFile(name: string, content: Blob): void {
  const url = URL.createObjectURL(content)
  const link = document.createElement('a')
  link.href = url
  link.download = name
  link.click()
  // The browser has the content once the click is handled; a later turn lets slow ones take it.
  setTimeout(() => URL.revokeObjectURL(url), 10_000)
}

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
  saveFile(name, content)
}
