import { type Command, isEnabled, useCommandStore } from './command-store.ts'

const mac = /^Mac|^iP/.test(navigator.platform)

interface Chord {
  readonly mod: boolean
  readonly shift: boolean
  readonly alt: boolean
  readonly key: string
}

/** 'Mod+Shift+Z' to its parts; the last may be the sign '+' itself. */
function partsOf(keys: string): readonly string[] {
  const [, before = '', key = ''] = /^((?:\w+\+)*)(.+)$/.exec(keys) ?? []
  return [...before.split('+').filter(Boolean), key]
}

function chordOf(text: string): Chord {
  const parts = partsOf(text)
  const key = parts.at(-1) ?? ''
  return {
    mod: parts.includes('Mod'),
    shift: parts.includes('Shift'),
    alt: parts.includes('Alt'),
    key: key.toLowerCase(),
  }
}

function matches(chord: Chord, event: KeyboardEvent): boolean {
  const mod = mac ? event.metaKey : event.ctrlKey
  const other = mac ? event.ctrlKey : event.metaKey
  return (
    !other &&
    mod === chord.mod &&
    event.altKey === chord.alt &&
    // A sign such as '?' is typed with Shift on some keyboards and without on others.
    (event.shiftKey === chord.shift || !/^[a-z0-9]$|^.{2,}$/.test(chord.key)) &&
    event.key.toLowerCase() === chord.key
  )
}

function inField(target: EventTarget | null): boolean {
  return (
    target instanceof HTMLElement &&
    (target.isContentEditable || target.matches('input, textarea, select'))
  )
}

/** How a shortcut reads on this machine: 'Ctrl Shift Z'. */
export function keysText(keys: string): string {
  const [first = ''] = keys.split(' ')
  const names: Record<string, string> = {
    ...(mac ? { Mod: '⌘', Shift: '⇧', Alt: '⌥' } : { Mod: 'Ctrl' }),
    ArrowLeft: '←',
    ArrowRight: '→',
    ArrowUp: '↑',
    ArrowDown: '↓',
  }
  return partsOf(first)
    .map((part) => names[part] ?? part)
    .join(mac ? '' : ' ')
}

function commandFor(event: KeyboardEvent): Command | undefined {
  const typing = inField(event.target)
  return useCommandStore
    .getState()
    .commands.find(
      (command) =>
        command.keys !== undefined &&
        !command.native &&
        (!typing || command.inFields) &&
        command.keys.split(' ').some((keys) => matches(chordOf(keys), event)),
    )
}

/** From now on the keys of registered commands run them. */
export function listenForShortcuts(): void {
  window.addEventListener('keydown', (event) => {
    if (event.defaultPrevented || event.isComposing) return
    if (document.querySelector('dialog[open]')) return
    const command = commandFor(event)
    if (!command) return
    // The browser's own meaning of the keys is kept away even while the command has nothing to do.
    event.preventDefault()
    if (isEnabled(command)) command.run()
  })
}
