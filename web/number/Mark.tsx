export type MarkName = 'error' | 'caution' | 'remark' | 'open' | 'square'

const drawings: Record<MarkName, React.ReactNode> = {
  error: <path d="M7 1.5 13 12.5H1ZM7 5.5V8.7M7 10.2V11.2" />,
  caution: <path d="M7 0.9 13.1 7 7 13.1 0.9 7ZM7 4V7.6M7 9.1V10.1" />,
  remark: <path d="M7 1A6 6 0 1 0 7 13 6 6 0 1 0 7 1M7 6.2V10.2M7 3.8V4.8" />,
  open: <circle cx="7" cy="7" r="5" strokeDasharray="2.3 1.63" />,
  square: <path d="M2 7.5 5.5 11 12 3.5" />,
}

const words: Record<MarkName, string> = {
  error: 'Error',
  caution: 'Caution',
  remark: 'Remark',
  open: 'Open',
  square: 'In order',
}

/** A mark of state, 12 px; `spoken` where no word stands beside it. */
export function Mark({ name, spoken = false }: { name: MarkName; spoken?: boolean }) {
  const className = `mark mark-${name}`
  return spoken ? (
    <svg className={className} viewBox="0 0 14 14" width="12" height="12" role="img">
      <title>{words[name]}</title>
      {drawings[name]}
    </svg>
  ) : (
    <svg className={className} viewBox="0 0 14 14" width="12" height="12" aria-hidden="true">
      {drawings[name]}
    </svg>
  )
}
