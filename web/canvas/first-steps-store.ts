import { create } from 'zustand'

const key = 'bledsteam/first-steps'
export const lastStep = 2

function kept(): number | null {
  try {
    return localStorage.getItem(key) === 'seen' ? null : 0
  } catch {
    return 0
  }
}

/** Which of the three hints is shown; null once they have been seen. */
export const useFirstSteps = create<{ readonly step: number | null }>()(() => ({ step: kept() }))

export function showStep(step: number | null): void {
  useFirstSteps.setState({ step })
  try {
    if (step === null) localStorage.setItem(key, 'seen')
  } catch {
    // Storage full or forbidden: they come again the next time.
  }
}
