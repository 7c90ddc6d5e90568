// One id a build, put in by vite.config.ts. Page and processor refuse each other when theirs differ: an old worklet from a cache would misread messages.
declare const __BUILD_ID__: string | undefined

export const BUILD_ID = typeof __BUILD_ID__ === 'string' ? __BUILD_ID__ : 'unbuilt'
