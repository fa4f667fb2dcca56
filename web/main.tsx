import { StrictMode } from 'react'
import { createRoot } from 'react-dom/client'
import { App } from './App.tsx'
import { useCommandStore } from './commands/command-store.ts'
import { listenForShortcuts } from './commands/shortcuts.ts'
import { windowCommands } from './commands/window-commands.ts'
import { listenForWhereFrom } from './drawer/where-from-store.ts'
import { startKeeping } from './files/keeping.ts'
import { listenForDrops, readExample } from './files/plant-file.ts'
import { layoutCommands } from './layouts/layout-commands.ts'
import { startReferences } from './store/reference-store.ts'
import { startSolving } from './store/solving.ts'
import { watchNetwork } from './strip/network-store.ts'
import { keepOffline } from './strip/offline.ts'
import './styles/theme.css'
import './styles/base.css'
import { followTheme } from './styles/theme.ts'

followTheme()
useCommandStore.getState().register([...windowCommands, ...layoutCommands])
listenForShortcuts()
listenForDrops()
listenForWhereFrom()
watchNetwork()

const place = document.getElementById('window')
if (!place) throw new Error('index.html has no element with the id "window".')

await startKeeping(readExample)
startSolving()
startReferences()
createRoot(place).render(
  <StrictMode>
    <App />
  </StrictMode>,
)
keepOffline()
