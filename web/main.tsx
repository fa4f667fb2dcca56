import { registerSW } from 'virtual:pwa-register'
import { StrictMode } from 'react'
import { createRoot } from 'react-dom/client'

const place = document.getElementById('window')
if (!place) throw new Error('index.html has no element with the id "window".')

createRoot(place).render(
  <StrictMode>
    <h1>Bledsteam</h1>
  </StrictMode>,
)

// Keeps every file for use without a network. A new version waits until all windows are closed.
registerSW({ immediate: true })
