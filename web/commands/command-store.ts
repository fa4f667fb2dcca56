import { create } from 'zustand'

export type CommandGroup = 'Plant' | 'Edit' | 'View' | 'Help'

/** Something that the user can have done: feeds the menu, the shortcuts and the command box alike. */
export interface Command {
  readonly id: string
  /** As it reads in the menu; a function where it changes: 'Undo: move heater 5'. */
  readonly name: string | (() => string)
  readonly group: CommandGroup
  /** 'Mod+Shift+Z'; Mod is Ctrl, on a Mac the command key. Several are parted by a blank. */
  readonly keys?: string
  /** The browser brings these keys as an event of its own (copy, paste): they are only shown. */
  readonly native?: true
  /** The shortcut also works while a text field has the focus. */
  readonly inFields?: true
  /** Not in the menu: reached by its keys and the command box. */
  readonly hidden?: true
  /** For commands that are switched on and off, or chosen among several. */
  readonly checked?: () => boolean
  readonly enabled?: () => boolean
  run(): void
}

interface CommandState {
  readonly commands: readonly Command[]
  /** Adds commands, in the order given; returns what takes them away again. */
  register(commands: readonly Command[]): () => void
}

export const useCommandStore = create<CommandState>()((set, get) => ({
  commands: [],
  register(commands) {
    set({ commands: [...get().commands, ...commands] })
    return () => {
      set({ commands: get().commands.filter((one) => !commands.includes(one)) })
    }
  },
}))

export function commandName({ name }: Command): string {
  return typeof name === 'function' ? name() : name
}

export function isEnabled(command: Command): boolean {
  return command.enabled?.() ?? true
}

/** Runs a command by its id, if it is there and can be run now. */
export function runCommand(id: string): void {
  const command = useCommandStore.getState().commands.find((one) => one.id === id)
  if (command && isEnabled(command)) command.run()
}
