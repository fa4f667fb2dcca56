/** Builds the window and serves it to this machine alone. */
import { build, preview } from 'vite'

const host = '127.0.0.1'
/** Not the tool's usual 4173, where another project's service worker may still answer. */
const usualPort = 4733

/** @param {unknown} error */
function fail(error) {
  console.error(error instanceof Error ? error.message : error)
  process.exit(1)
}

await build({ logLevel: 'warn' }).catch((error) => {
  console.error('The window could not be built.')
  fail(error)
})

const server = await preview({
  logLevel: 'warn',
  preview: { host, port: usualPort, strictPort: false },
}).catch(fail)
const address = server?.httpServer.address()
const port = typeof address === 'object' && address ? address.port : usualPort
if (port !== usualPort) {
  console.log(
    `Port ${usualPort} is taken, so Bledsteam is served on port ${port}. The browser keeps unsaved ` +
      'work by address: a plant left open at the usual one is not seen at this one.',
  )
}
console.log(`Bledsteam: http://${host}:${port}/   (Ctrl+C ends it)`)
