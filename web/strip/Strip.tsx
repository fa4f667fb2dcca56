import { useState } from 'react'
import { setTitle, unitOf, unitSets } from '../../src/document.ts'
import { CommandBox } from '../commands/CommandBox.tsx'
import { useCommandStore } from '../commands/command-store.ts'
import { Menu } from '../commands/Menu.tsx'
import { keysText } from '../commands/shortcuts.ts'
import { useKeepingStore } from '../files/keeping-store.ts'
import { FirstCase } from '../layouts/CaseRow.tsx'
import { LayoutTabs } from '../layouts/LayoutTabs.tsx'
import { openUnits } from '../number/units-store.ts'
import { usePlantStore } from '../store/plant-store.ts'
import { useSettingsStore, useUnitChoice } from '../store/settings-store.ts'
import { Icon } from './Icon.tsx'
import { useNetworkStore } from './network-store.ts'
import './strip.css'

function Title() {
  const title = usePlantStore((state) => state.plant.title)
  const [text, setText] = useState<string | null>(null)
  const commit = () => {
    const wanted = text?.trim()
    setText(null)
    if (wanted && wanted !== title) {
      usePlantStore.getState().edit(`Title ${wanted}`, (plant) => setTitle(plant, wanted))
    }
  }
  return (
    <h1 className="title">
      <input
        aria-label="Title of the plant"
        title={title}
        value={text ?? title}
        spellCheck={false}
        size={Math.max(8, Math.min(28, (text ?? title).length))}
        onChange={(event) => setText(event.target.value)}
        onBlur={commit}
        onKeyDown={(event) => {
          if (event.key === 'Enter') event.currentTarget.blur()
          else if (event.key === 'Escape') {
            setText(null)
            event.stopPropagation()
          }
        }}
      />
    </h1>
  )
}

function UndoRedo() {
  const undone = usePlantStore((state) => state.past.at(-1)?.name)
  const redone = usePlantStore((state) => state.future.at(-1)?.name)
  const undo = usePlantStore((state) => state.undo)
  const redo = usePlantStore((state) => state.redo)
  return (
    <div className="strip-group">
      <button
        type="button"
        className="icon-button"
        aria-label={undone ? `Undo: ${undone}` : 'Undo'}
        title={undone ? `Undo: ${undone} (${keysText('Mod+Z')})` : 'Nothing to undo'}
        disabled={!undone}
        onClick={undo}
      >
        <Icon name="undo" />
      </button>
      <button
        type="button"
        className="icon-button"
        aria-label={redone ? `Redo: ${redone}` : 'Redo'}
        title={redone ? `Redo: ${redone} (${keysText('Mod+Shift+Z')})` : 'Nothing to redo'}
        disabled={!redone}
        onClick={redo}
      >
        <Icon name="redo" />
      </button>
    </div>
  )
}

function Units() {
  const unitSet = useSettingsStore((state) => state.unitSet)
  const units = useUnitChoice()
  const change = useSettingsStore((state) => state.change)
  return (
    <label className="choice">
      <span className="visually-hidden">Units</span>
      <span aria-hidden="true">
        {unitOf('pressure', units).name}, {unitOf('temperature', units).name}
      </span>
      <select
        className="choice-behind"
        title="Units of measure"
        value={unitSet}
        onChange={(event) => {
          const chosen = unitSets.find(({ name }) => name === event.target.value)
          if (chosen) change({ unitSet: chosen.name })
          else openUnits()
        }}
      >
        {unitSets.map(({ name, label, sample }) => (
          <option key={name} value={name}>
            {label}: {sample}
          </option>
        ))}
        <option value="single">Single units …</option>
      </select>
      <Icon name="down" size={12} />
    </label>
  )
}

const keepingWords = {
  kept: 'Saved here',
  writing: 'Saving',
  elsewhere: 'Not saved',
  failed: 'Not saved',
} as const

const keepingHelp = {
  kept: 'This plant is kept in this browser, on this machine only. Save it to a file to pass it on.',
  writing: 'Being kept in this browser.',
  elsewhere: 'This plant is open in another window, which keeps it.',
  failed: 'This browser refuses to keep the plant. Save it to a file.',
} as const

function Keeping() {
  const state = useKeepingStore((keeping) => keeping.state)
  const calm = state === 'kept' || state === 'writing'
  return (
    <span className="state" data-calm={calm} title={keepingHelp[state]} role="status">
      <Icon name={calm ? 'check' : 'close'} size={14} />
      <span className="state-word">{keepingWords[state]}</span>
    </span>
  )
}

function Network() {
  const { online, keptOffline } = useNetworkStore()
  const word = online ? (keptOffline ? 'Works offline' : 'Online') : 'Offline'
  const help = online
    ? keptOffline
      ? 'Everything needed is kept on this machine: the window also opens without a network.'
      : 'The window is being kept for use without a network.'
    : 'No network, and none is needed.'
  return (
    <span className="state" data-calm="true" title={help}>
      <Icon name={online ? 'online' : 'offline'} size={14} />
      <span className="state-word">{word}</span>
    </span>
  )
}

/** The strip along the top: what is open, what was done, what can be found, how numbers are shown. */
export function Strip() {
  // Names of commands and the shortcuts in titles follow what is registered.
  useCommandStore((state) => state.commands.length)
  return (
    <header className="strip">
      <Menu />
      <Title />
      <LayoutTabs />
      <FirstCase />
      <span className="strip-line" />
      <UndoRedo />
      <CommandBox />
      <span className="strip-space" />
      <Units />
      <span className="strip-line" />
      <Keeping />
      <Network />
    </header>
  )
}
