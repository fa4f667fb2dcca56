import { fileURLToPath } from 'node:url'
import react from '@vitejs/plugin-react'
import type { Plugin } from 'vite'
import { VitePWA } from 'vite-plugin-pwa'
import { defineConfig } from 'vitest/config'

const contentSecurityPolicy = [
  "default-src 'self'",
  "script-src 'self'",
  "style-src 'self'",
  "worker-src 'self'",
  "img-src 'self' data: blob:",
  "connect-src 'self'",
  "object-src 'none'",
  "base-uri 'none'",
].join('; ')

/** Plant data never leave the machine: the built page can reach nothing but its own files. */
function contentSecurityPolicyTag(): Plugin {
  return {
    name: 'content-security-policy',
    apply: 'build',
    transformIndexHtml: () => [
      {
        tag: 'meta',
        attrs: { 'http-equiv': 'Content-Security-Policy', content: contentSecurityPolicy },
        injectTo: 'head-prepend',
      },
    ],
  }
}

/** Everything is kept at the first visit; a new version waits until the user takes it. */
const offline = VitePWA({
  strategies: 'generateSW',
  registerType: 'prompt',
  injectRegister: false,
  workbox: {
    globPatterns: ['**/*.{js,css,html,svg,png,json,woff2}'],
    maximumFileSizeToCacheInBytes: 8 * 1024 * 1024,
    navigateFallback: 'index.html',
    cleanupOutdatedCaches: true,
  },
  manifest: {
    id: '/',
    name: 'Bledsteam',
    short_name: 'Bledsteam',
    description: 'Flowsheets and heat balances of regenerative Rankine cycles',
    lang: 'en',
    display: 'standalone',
    background_color: '#FBFAF7',
    theme_color: '#FBFAF7',
    icons: [
      { src: 'icon.svg', sizes: 'any', type: 'image/svg+xml' },
      { src: 'icon-192.png', sizes: '192x192', type: 'image/png' },
      { src: 'icon-512.png', sizes: '512x512', type: 'image/png' },
      { src: 'icon-maskable-512.png', sizes: '512x512', type: 'image/png', purpose: 'maskable' },
    ],
  },
})

export default defineConfig({
  root: 'web',
  publicDir: '../public',
  plugins: [react(), contentSecurityPolicyTag(), offline],
  worker: { format: 'es' },
  build: {
    outDir: '../dist',
    emptyOutDir: true,
    target: 'es2023',
    // The security policy lets a page's fonts and code come from files only.
    assetsInlineLimit: 0,
  },
  test: {
    root: fileURLToPath(new URL('.', import.meta.url)),
    reporters: ['default', './test/reporter/closing-line.ts'],
    allowOnly: false,
    projects: [
      {
        extends: true,
        test: {
          name: 'engine',
          environment: 'node',
          include: ['test/**/*.test.{ts,tsx}'],
          exclude: ['test/browser/**'],
          setupFiles: ['test/fixed-seed.ts'],
          // Most of the time would go into loading the same modules for each file anew.
          isolate: false,
          // A slow machine is no fault; what hangs still ends.
          testTimeout: 120_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'browser',
          environment: 'node',
          include: ['test/browser/**/*.test.ts'],
          globalSetup: ['test/browser/preview.ts'],
          // Each file drives a browser of its own, which waits as often as it works.
          maxWorkers: 2,
          testTimeout: 60_000,
          hookTimeout: 60_000,
          // A condition comes true when the machine has time for it.
          expect: { poll: { timeout: 15_000 } },
        },
      },
    ],
  },
})
