import type { Plant } from '../document.ts'

export function setTitle(plant: Plant, title: string): Plant {
  return plant.title === title ? plant : { ...plant, title }
}
