import { numberedPort, portNamed, type Shape, type UnitKind } from '../../src/units/kind.ts'

/** Names that a kind mentions and does not have, and ports that it forgets. */
export function nameFaults(kind: UnitKind, shape: Shape): string[] {
  const faults: string[] = []
  const { ports, quantities } = kind
  const hasPort = (name: string): boolean =>
    Object.hasOwn(ports, name) || portNamed(ports, name) !== undefined
  const hasQuantity = (name: string): boolean => {
    const plain = Object.hasOwn(quantities, name) && quantities[name]!.each === undefined
    const [, stem = ''] = /^(.*?)[1-9]\d*$/.exec(name) ?? []
    return plain || quantities[stem]?.each !== undefined
  }
  const port = (name: string, where: string): void => {
    if (!hasPort(name)) faults.push(`${where}: no port ${name}`)
  }
  const quantity = (name: string, where: string): void => {
    if (!hasQuantity(name)) faults.push(`${where}: no quantity ${name}`)
  }
  for (const [name, { repeated }] of Object.entries(ports)) {
    const numbered = repeated ? numberedPort(ports, name, 2) : name
    const found = portNamed(ports, numbered)
    if (found?.port !== name || found.number !== (repeated && 2)) {
      faults.push(`port ${name} is not found by its name ${numbered}`)
    }
  }
  for (const [name, { each }] of Object.entries(quantities)) {
    if (each && !ports[each.port]?.repeated) faults.push(`${name} is counted by no repeated port`)
  }
  if (kind.chief !== undefined) quantity(kind.chief, 'chief')
  for (const [name, start] of Object.entries(kind.starts)) {
    port(name, 'starts')
    if (typeof start !== 'object') continue
    port(start.as, 'starts')
    if (start.warmerBy !== undefined) quantity(start.warmerBy, 'starts')
  }
  for (const [name, { direction }] of Object.entries(ports)) {
    const isGuessed = kind.starts[name] !== undefined || kind.secondLaw === 'edge'
    if (direction === 'out' && !isGuessed) faults.push(`starts: none of ${name}`)
  }
  for (const [from, to] of kind.passes ?? []) {
    port(from, 'passes')
    port(to, 'passes')
  }
  for (const { from, to } of kind.paths(shape)) {
    port(from, 'paths')
    port(to, 'paths')
  }
  if (kind.heatPassage) {
    const { cold, hot, residualSuperheat, differences } = kind.heatPassage
    for (const side of [cold, hot]) {
      if ('from' in side) {
        port(side.from, 'heatPassage')
        port(side.to, 'heatPassage')
      } else {
        quantity(side.inletTemperature, 'heatPassage')
        quantity(side.rise, 'heatPassage')
      }
    }
    if (residualSuperheat !== undefined) quantity(residualSuperheat, 'heatPassage')
    for (const difference of differences) quantity(difference.quantity, 'heatPassage')
  }
  for (const rule of kind.freezing?.({ shape, drivesGenerator: true }) ?? []) {
    quantity(rule.quantity, 'freezing')
    for (const name of rule.frees) quantity(name, 'freezing')
    if (rule.needs !== undefined) quantity(rule.needs, 'freezing')
    if (!rule.law) continue
    const { against, exponent } = rule.law
    if (typeof against === 'string') quantity(against, 'freezing')
    else port(against.port, 'freezing')
    if (typeof exponent === 'string') quantity(exponent, 'freezing')
  }
  if (kind.outOfService) {
    for (const name of kind.outOfService.meaningless) quantity(name, 'outOfService')
    for (const name of kind.outOfService.frees) quantity(name, 'outOfService')
    for (const name of kind.outOfService.idlePorts) port(name, 'outOfService')
  }
  return faults
}
