// Files out: a download everywhere; a chosen place that can be written again, where the browser has the File System Access interface.

export interface PickedPlace {
  readonly name: string
  createWritable(): Promise<{ write(text: string): Promise<void>; close(): Promise<void> }>
}

type SavePicker = (options: {
  readonly suggestedName: string
  readonly types: readonly { readonly description: string; readonly accept: Readonly<Record<string, readonly string[]>> }[]
}) => Promise<PickedPlace>

const picker = () => (window as unknown as { showSaveFilePicker?: SavePicker }).showSaveFilePicker

export const canPickPlace = (): boolean => picker() !== undefined

/** Asks where to save; null when the user changed their mind. */
export async function pickPlace(suggestedName: string): Promise<PickedPlace | null> {
  try {
    const types = [{ description: 'Combwright set', accept: { 'application/json': ['.json'] } }]
    return (await picker()?.call(window, { suggestedName, types })) ?? null
  } catch {
    return null
  }
}

/** Replaces the file's text. Rejects when the browser does not allow it any more. */
export async function writeTo(place: PickedPlace, text: string): Promise<void> {
  const file = await place.createWritable()
  await file.write(text)
  await file.close()
}

/** Hands a file to the browser's downloads. */
export function download(name: string, content: Blob): void {
  const url = URL.createObjectURL(content)
  const link = document.createElement('a')
  link.href = url
  link.download = name
  link.click()
  // The browser has the content once the click is handled; a later turn lets slow ones take it.
  setTimeout(() => URL.revokeObjectURL(url), 10_000)
}

/** Asks for one file; null when the user changed their mind. */
export function chooseFile(accept: string): Promise<File | null> {
  return new Promise((resolve) => {
    const input = document.createElement('input')
    input.type = 'file'
    input.accept = accept
    input.addEventListener('change', () => resolve(input.files?.[0] ?? null))
    input.addEventListener('cancel', () => resolve(null))
    input.click()
  })
}
