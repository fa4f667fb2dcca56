/** Writes the generated files of src/steam/if97: `node --import tsx test/steam/unroll.ts`. */
import { writeFileSync } from 'node:fs'
import { unrolledFiles } from '../../src/steam/if97/generate.ts'

for (const [name, text] of unrolledFiles()) {
  writeFileSync(new URL(`../../src/steam/if97/${name}`, import.meta.url), text)
}
