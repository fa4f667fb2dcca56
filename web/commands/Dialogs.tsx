import { type ReactNode, useEffect, useState } from 'react'
import { openKept } from '../files/keeping.ts'
import { type KeptPlant, keptPlants } from '../files/kept-plants.ts'
import { type Example, openExample, readExamples } from '../files/plant-file.ts'
import { commandName, useCommandStore } from './command-store.ts'
import { Dialog as Shell } from './Dialog.tsx'
import { useDialogStore } from './dialog-store.ts'
import { keysText } from './shortcuts.ts'

function Dialog({ title, children }: { title: string; children: ReactNode }) {
  const close = useDialogStore((state) => state.close)
  return (
    <Shell title={title} onClose={close}>
      {children}
    </Shell>
  )
}

function About() {
  return (
    <Dialog title="Bledsteam">
      <p>
        Flowsheets and heat balances of regenerative Rankine cycles. Every number is given or
        solved, and a click turns it round. Steam and water by IAPWS-IF97.
      </p>
      <p>
        Plants stay on this machine: the window sends nothing anywhere and works without a network.
      </p>
      <p>
        <strong>Caution.</strong> Results are for sketching and checking. Steady flow; kinetic and
        potential energy are neglected unless a quantity names them. Pressure equipment and changes
        to a plant need the applicable codes and local rules, the makers' data and a licensed
        engineer.
      </p>
    </Dialog>
  )
}

function Keys() {
  const commands = useCommandStore((state) => state.commands)
  return (
    <Dialog title="Keys">
      <dl className="keys">
        {commands
          .filter(({ keys }) => keys !== undefined)
          .map((command) => (
            <div key={command.id}>
              <dt>{commandName(command)}</dt>
              <dd>{keysText(command.keys ?? '')}</dd>
            </div>
          ))}
        <div>
          <dt>In a number: change it by a step, by ten steps</dt>
          <dd>Up, Down, Shift Up, Shift Down</dd>
        </div>
        <div>
          <dt>On a number: type to give it, free it</dt>
          <dd>0 to 9, Delete</dd>
        </div>
        <div>
          <dt>On a number: where it comes from</dt>
          <dd>W, or a click with {keysText('Alt')}</dd>
        </div>
        <div>
          <dt>On a given number: change it live</dt>
          <dd>Drag sideways; Shift finer</dd>
        </div>
        <div>
          <dt>In a number: give it as it stands, leave it</dt>
          <dd>Enter, Escape</dd>
        </div>
      </dl>
    </Dialog>
  )
}

function Kept() {
  const [plants, setPlants] = useState<readonly KeptPlant[] | null>(null)
  const close = useDialogStore((state) => state.close)
  useEffect(() => {
    keptPlants().then(setPlants, () => setPlants([]))
  }, [])
  return (
    <Dialog title="Plants kept in this browser">
      {plants?.length === 0 && <p className="muted">None yet.</p>}
      <ul className="kept">
        {plants?.map(({ id, title, at }) => (
          <li key={id}>
            <button
              type="button"
              onClick={() => {
                close()
                void openKept(id)
              }}
            >
              <span>{title || 'Untitled plant'}</span>
              <span className="muted">
                {new Date(at).toLocaleString(undefined, {
                  dateStyle: 'medium',
                  timeStyle: 'short',
                })}
              </span>
            </button>
          </li>
        ))}
      </ul>
      <p className="muted">
        The last 20 are kept, on this machine only. Save a plant to a file to pass it on or to be
        sure of it.
      </p>
    </Dialog>
  )
}

function Examples() {
  const [examples, setExamples] = useState<readonly Example[] | null>(null)
  const close = useDialogStore((state) => state.close)
  useEffect(() => {
    readExamples().then(setExamples, () => setExamples([]))
  }, [])
  return (
    <Dialog title="Example plants">
      {examples?.length === 0 && <p className="muted">The examples cannot be read.</p>}
      <ul className="kept examples">
        {examples?.map((example) => (
          <li key={example.file}>
            <button
              type="button"
              onClick={() => {
                close()
                void openExample(example)
              }}
            >
              <strong>{example.title}</strong>
              <span className="muted">{example.shows}</span>
            </button>
          </li>
        ))}
      </ul>
      <p className="muted">
        Invented plants with realistic numbers. An example opens as a plant of its own; the one
        before stays kept in this browser.
      </p>
    </Dialog>
  )
}

const dialogs = { about: About, keys: Keys, kept: Kept, examples: Examples }

export function Dialogs() {
  const open = useDialogStore((state) => state.open)
  if (!open) return null
  const Shown = dialogs[open]
  return <Shown key={open} />
}
