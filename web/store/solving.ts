import { createSolverClient } from '../worker/client.ts'
import { type Asked, useBalanceStore } from './balance-store.ts'
import { usePlantStore } from './plant-store.ts'
import { startAsking } from './questions.ts'
import { sameBalance } from './same-balance.ts'
import { expectBalance, showNow } from './shown-together.ts'
import { useSolvingStore } from './solving-store.ts'
import { startWorker } from './start-worker.ts'

/** From now on every edit that can change the balance is solved, and the balance is shown. */
export function startSolving(): void {
  const shown = useBalanceStore.getState()
  const client = createSolverClient<Asked>(startWorker, {
    balance(names, balance, asked) {
      shown.show(names, balance, asked)
      showNow()
    },
    dome: shown.showDome,
    unusable(message) {
      shown.clear()
      shown.showTrouble(message)
      showNow()
    },
    gaveUp: shown.showTrouble,
    busy: useSolvingStore.getState().setBusy,
  })

  let edit = 0
  let step = -1
  const ask = () => {
    const { plant, layoutId, caseId, opened, step: stepNow, stepName } = usePlantStore.getState()
    if (stepNow !== step) edit += 1
    step = stepNow
    expectBalance()
    const subject = `${opened}/${layoutId}/${caseId ?? ''}`
    client.solve({ plant, layout: layoutId, case: caseId }, { subject, edit, editName: stepName })
  }

  usePlantStore.subscribe((now, then) => {
    if (
      now.layoutId !== then.layoutId ||
      now.caseId !== then.caseId ||
      now.opened !== then.opened ||
      (now.plant !== then.plant && !sameBalance(now.plant, then.plant))
    ) {
      ask()
    }
  })
  ask()
  startAsking(client.ask)
}
