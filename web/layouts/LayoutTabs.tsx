import { whyNotRemoved } from '../../src/document.ts'
import { usePlantStore } from '../store/plant-store.ts'
import { Icon } from '../strip/Icon.tsx'
import { showComparison } from './comparison.ts'
import { addEmptyLayout, deleteLayout, proposeFrom, renameLayout, shiftLayout } from './edits.ts'
import { PopMenu } from './PopMenu.tsx'
import { SameMachine } from './SameMachine.tsx'
import { Tabs } from './Tabs.tsx'
import './layouts.css'

/** The layouts of the plant: the plant as it is, and proposals beside it. */
export function LayoutTabs() {
  const plant = usePlantStore((state) => state.plant)
  const layoutId = usePlantStore((state) => state.layoutId)
  const show = usePlantStore((state) => state.showLayout)
  const { layouts } = plant
  const at = layouts.findIndex(({ id }) => id === layoutId)
  return (
    <Tabs
      label="Layouts"
      what="layout"
      tabs={layouts}
      selected={layoutId}
      show={show}
      rename={renameLayout}
      actions={(id) => [
        { name: 'Propose a change of it', run: () => proposeFrom(id) },
        {
          name: 'Move left',
          why: at <= 0 ? 'It is the first.' : undefined,
          run: () => shiftLayout(id, -1),
        },
        {
          name: 'Move right',
          why: at >= layouts.length - 1 ? 'It is the last.' : undefined,
          run: () => shiftLayout(id, 1),
        },
        ...layouts
          .filter((other) => other.id !== id)
          .map((other) => ({
            name: `Compare with ${other.name}`,
            run: () => showComparison({ layoutId: other.id, caseId: null }),
          })),
        { name: 'Delete', why: whyNotRemoved(plant, id), run: () => deleteLayout(id) },
      ]}
    >
      <PopMenu
        label="Add a layout"
        button={<Icon name="plus" size={14} />}
        actions={[
          { name: 'Proposal on the machine that is there', run: () => proposeFrom(layoutId) },
          { name: 'Empty layout', run: addEmptyLayout },
        ]}
      />
      <SameMachine />
    </Tabs>
  )
}
