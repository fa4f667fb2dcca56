import { beforeEach, expect, test } from 'vitest'
import { addUnit, emptyPlant, moveUnits, type Plant, setTitle } from '../../src/document.ts'
import { editLayout, readLayout, usePlantStore } from '../../web/store/plant-store.ts'

const store = () => usePlantStore.getState()
const retitle = (title: string) => (plant: Plant) => setTitle(plant, title)

beforeEach(() => {
  store().open(emptyPlant('First'))
})

test('an edit is done, undone and redone under its name', () => {
  store().edit('Title Second', retitle('Second'))
  expect(store().plant.title).toBe('Second')
  expect(store().past.map(({ name }) => name)).toEqual(['Title Second'])
  store().undo()
  expect(store().plant.title).toBe('First')
  expect(store().future.map(({ name }) => name)).toEqual(['Title Second'])
  store().redo()
  expect(store().plant.title).toBe('Second')
  expect(store().future).toEqual([])
})

test('an edit that changes nothing is no step, and one after an undo takes the redo away', () => {
  store().edit('Nothing', (plant) => plant)
  expect(store().past).toEqual([])
  store().edit('Title Second', retitle('Second'))
  store().undo()
  store().edit('Title Third', retitle('Third'))
  expect(store().future).toEqual([])
  store().undo()
  expect(store().plant.title).toBe('First')
})

test('a drag of many moves is one step; the next drag is another', () => {
  editLayout('Place a pump', (plant, id) => addUnit(plant, id, 'pump', [0, 0]).plant)
  const [pump] = readLayout().units
  const drag = (merge: string) => {
    for (let i = 0; i < 5; i++) {
      editLayout('Move pump', (plant, id) => moveUnits(plant, id, [pump?.id ?? ''], [8, 0]), {
        merge,
      })
    }
  }
  drag('drag 1')
  drag('drag 2')
  expect(store().past).toHaveLength(3)
  expect(readLayout().units[0]?.at).toEqual([80, 0])
  store().undo()
  expect(readLayout().units[0]?.at).toEqual([40, 0])
  store().undo()
  expect(readLayout().units[0]?.at).toEqual([0, 0])
  store().redo()
  store().redo()
  expect(readLayout().units[0]?.at).toEqual([80, 0])
})

test('moves with the same key do not join over an undo', () => {
  const merge = 'title'
  store().edit('Title a', retitle('a'), { merge })
  store().edit('Title b', retitle('b'), { merge })
  store().undo()
  expect(store().plant.title).toBe('First')
  store().redo()
  store().edit('Title c', retitle('c'), { merge })
  expect(store().past).toHaveLength(2)
  store().undo()
  expect(store().plant.title).toBe('b')
})

test('an edit that throws leaves the plant and the undo stack as they were', () => {
  store().edit('Title Second', retitle('Second'))
  const before = store().plant
  expect(() =>
    store().edit('Fails', () => {
      throw new Error('no')
    }),
  ).toThrow('no')
  expect(store().plant).toBe(before)
  expect(store().past).toHaveLength(1)
})

test('opening a plant starts the undo stack anew and shows its first layout', () => {
  store().edit('Title Second', retitle('Second'))
  const { opened } = store()
  store().open(emptyPlant('Other'))
  expect(store().past).toEqual([])
  expect(store().opened).toBe(opened + 1)
  expect(store().layoutId).toBe(store().plant.layouts[0]?.id)
})

test('undo shows the layout again in which the edit was made', () => {
  const plant = emptyPlant('Two layouts')
  const [base] = plant.layouts
  if (!base) throw new Error('an empty plant has a layout')
  store().open({ ...plant, layouts: [base, { ...base, id: 'other', name: 'Other' }] })
  editLayout('Place a pump', (present, id) => addUnit(present, id, 'pump', [0, 0]).plant)
  store().showLayout('other')
  expect(readLayout().units).toEqual([])
  store().undo()
  expect(store().layoutId).toBe(base.id)
  store().redo()
  expect(readLayout().units).toHaveLength(1)
})
