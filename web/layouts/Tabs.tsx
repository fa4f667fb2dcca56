import { type KeyboardEvent, type ReactNode, useRef, useState } from 'react'
import { Icon } from '../strip/Icon.tsx'
import { type MenuAction, PopMenu } from './PopMenu.tsx'
import { TabName } from './TabName.tsx'

export interface Tab {
  readonly id: string
  readonly name: string
  /** The tab's panel and name are fixed: it cannot be renamed. */
  readonly fixed?: true
}

interface TabsProps {
  readonly label: string
  /** 'layout' or 'case', for what is said of one. */
  readonly what: string
  readonly tabs: readonly Tab[]
  readonly selected: string
  readonly children?: ReactNode
  show(id: string): void
  rename(id: string, name: string): void
  actions(id: string): readonly MenuAction[]
}

/** Tabs that can be renamed (double click, F2) and have a menu each; arrows go from one to the next. */
export function Tabs({ label, what, tabs, selected, children, show, rename, actions }: TabsProps) {
  const [naming, setNaming] = useState<string | null>(null)
  const list = useRef<HTMLDivElement>(null)

  const onKeyDown = (event: KeyboardEvent) => {
    const step = { ArrowRight: 1, ArrowLeft: -1 }[event.key]
    const one = tabs.find(({ id }) => id === selected)
    if (event.key === 'F2' && one && !one.fixed) setNaming(selected)
    else if (step) {
      const at = tabs.findIndex(({ id }) => id === selected)
      const next = tabs[(at + step + tabs.length) % tabs.length]
      if (!next) return
      show(next.id)
      list.current?.querySelector<HTMLElement>(`[data-tab="${next.id}"]`)?.focus()
    } else return
    event.preventDefault()
    event.stopPropagation()
  }

  return (
    <div className="tabs-place">
      <div ref={list} className="layouts" role="tablist" aria-label={label}>
        {tabs.map(({ id, name, fixed }) =>
          naming === id ? (
            <TabName
              key={id}
              name={name}
              label={`Name of the ${what}`}
              onName={(wanted) => rename(id, wanted)}
              onEnd={() => setNaming(null)}
            />
          ) : (
            <button
              key={id}
              type="button"
              role="tab"
              data-tab={id}
              tabIndex={id === selected ? 0 : -1}
              aria-selected={id === selected}
              onClick={() => show(id)}
              onDoubleClick={() => {
                if (!fixed) setNaming(id)
              }}
              onKeyDown={onKeyDown}
            >
              {name}
            </button>
          ),
        )}
      </div>
      <PopMenu
        label={`More of ${what} ${tabs.find(({ id }) => id === selected)?.name ?? ''}`}
        button={<Icon name="down" size={12} />}
        actions={[
          ...(tabs.find(({ id }) => id === selected)?.fixed
            ? []
            : [{ name: 'Rename', run: () => setNaming(selected) }]),
          ...actions(selected),
        ]}
      />
      {children}
    </div>
  )
}
