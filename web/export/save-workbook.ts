import { readChartSource } from '../chart/chart-source.ts'
import { tableBuilders } from '../drawer/tables/tables.ts'
import { readLayout, usePlantStore } from '../store/plant-store.ts'
import { readUnitChoice } from '../store/settings-store.ts'
import { useNoticeStore } from '../strip/notice-store.ts'
import { downloadBlob, fileStem } from './download.ts'
import { workbookOf } from './workbook.ts'

/** Saves all tables of the balance shown, every column, as a workbook. */
export async function saveWorkbook(): Promise<void> {
  const source = readChartSource()
  const tables = Object.values(tableBuilders)
    .map((build) => build(source))
    .filter(({ rows }) => rows.length > 0)
  try {
    const file = await workbookOf(tables, readUnitChoice())
    downloadBlob(`${fileStem(usePlantStore.getState().plant.title, readLayout().name)}.xlsx`, file)
  } catch (error) {
    useNoticeStore.getState().say({
      id: 'table',
      severity: 'error',
      text: `The workbook could not be made (${error instanceof Error ? error.message : 'unknown cause'}). Save the tables as CSV instead.`,
    })
  }
}
