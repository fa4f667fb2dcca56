const drawings = {
  menu: 'M2.5 4H13.5M2.5 8H13.5M2.5 12H13.5',
  undo: 'M5.5 2.5 2.5 5.5 5.5 8.5M2.5 5.5H9.5A4 4 0 0 1 9.5 13.5H6',
  redo: 'M10.5 2.5 13.5 5.5 10.5 8.5M13.5 5.5H6.5A4 4 0 0 0 6.5 13.5H10',
  search: 'M7 2.5A4.5 4.5 0 1 0 7 11.5 4.5 4.5 0 1 0 7 2.5M10.3 10.3 14 14',
  down: 'M4 6 8 10 12 6',
  up: 'M4 10 8 6 12 10',
  close: 'M3.5 3.5 12.5 12.5M12.5 3.5 3.5 12.5',
  check: 'M2.5 8.5 6.5 12.5 13.5 4',
  offline:
    'M2 2 14 14M1.5 6.5A10 10 0 0 1 5 4.4M7.5 3.8A10 10 0 0 1 14.5 6.5M4 9.2A6 6 0 0 1 7 7.6M10.5 8.3A6 6 0 0 1 12 9.2M8 12.4V12.5',
  online: 'M1.5 6.5A10 10 0 0 1 14.5 6.5M4 9.2A6 6 0 0 1 12 9.2M8 12.4V12.5',
  busy: 'M8 2A6 6 0 1 0 14 8',
  plus: 'M8 3V13M3 8H13',
  more: 'M8 3.2V3.3M8 8V8.1M8 12.7V12.8',
} as const

export type IconName = keyof typeof drawings

/** An icon of 16 px in the text's colour; what it means is said by the control that holds it. */
export function Icon({ name, size = 16 }: { name: IconName; size?: number }) {
  return (
    <svg className="icon" viewBox="0 0 16 16" width={size} height={size} aria-hidden="true">
      <path d={drawings[name]} />
    </svg>
  )
}
