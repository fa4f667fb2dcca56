/** Holds a kept plant for this window alone, so that two windows never write over each other. */
export interface PlantLock {
  /** Takes the plant if no other window has it. Lets go of what this window held before. */
  take(id: string): Promise<boolean>
  /** Takes it from whichever window has it; that window is told. */
  seize(id: string): Promise<void>
}

const lockName = (id: string) => `bledsteam/plant/${id}`

/** `lost` is called when another window has seized the plant. */
export function createPlantLock(lost: () => void): PlantLock {
  let letGo: (() => void) | null = null
  let turn = 0

  const request = (id: string, options: LockOptions): Promise<boolean> => {
    // A browser without locks (or a page that may not use them) has nothing to guard with.
    if (!navigator.locks) return Promise.resolve(true)
    letGo?.()
    turn += 1
    const mine = turn
    return new Promise((resolve) => {
      navigator.locks
        .request(lockName(id), options, (lock) => {
          resolve(lock !== null)
          if (!lock) return
          return new Promise<void>((release) => {
            letGo = release
          })
        })
        .catch(() => {
          resolve(false)
          if (mine === turn) lost()
        })
    })
  }

  return {
    take: (id) => request(id, { ifAvailable: true }),
    async seize(id) {
      await request(id, { steal: true })
    },
  }
}
