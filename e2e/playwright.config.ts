import { defineConfig } from '@playwright/test'
import { findChromium } from '../tests/tools.ts'

const port = 4811
const executablePath = findChromium()

export default defineConfig({
  testDir: '.',
  outputDir: '../test-results',
  // The audio specs listen in real time: two pages at once on two cores would starve each other's sound.
  workers: 1,
  // Machines that run this are shared and noisy: a test waits, it never measures time.
  timeout: 150_000,
  expect: { timeout: 20_000 },
  retries: 0,
  forbidOnly: true,
  reporter: [['list']],
  use: {
    baseURL: `http://localhost:${port}/`,
    viewport: { width: 1366, height: 768 },
    launchOptions: {
      ...(executablePath ? { executablePath } : {}),
      args: [
        '--no-sandbox',
        '--disable-gpu',
        '--disable-quic',
        '--no-first-run',
        '--disable-background-networking',
        '--disable-component-update',
        '--disable-sync',
        '--use-fake-device-for-media-stream',
        '--use-fake-ui-for-media-stream',
      ],
    },
  },
  // The built page with its policy headers, as npm start serves it.
  webServer: {
    command: `node ../.ci/with-packages.mjs src/cli/serve.ts --port ${port}`,
    url: `http://localhost:${port}/`,
    timeout: 120_000,
    reuseExistingServer: false,
  },
})
