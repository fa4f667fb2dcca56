import { standaloneSvg } from '../export/standalone-svg.ts'
import themeCss from '../styles/theme.css?inline'
import reportCss from './report.css?inline'

const escaped = (text: string): string =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;')

/** Nothing is loaded and nothing runs: what the file shows is in it. */
const policy = "default-src 'none'; style-src 'unsafe-inline'; img-src data:"

/** The report as one file that opens by itself, in any browser and without a network. */
export function reportFile(page: HTMLElement, title: string): string {
  const copy = page.cloneNode(true) as HTMLElement
  const drawn = page.querySelectorAll('svg')
  copy.querySelectorAll('svg').forEach((svg, i) => {
    const source = drawn[i]
    if (!source) return
    const within = source.closest('.chart-picture') ? 'chart-picture white-paper' : 'white-paper'
    const holder = document.createElement('template')
    holder.innerHTML = standaloneSvg(source, { within, ground: 'none' })
    svg.replaceWith(holder.content)
  })
  for (const element of copy.querySelectorAll('[role="listbox"], .visually-hidden'))
    element.remove()
  return [
    '<!doctype html>',
    '<html lang="en" data-theme="light">',
    '<head>',
    '<meta charset="utf-8">',
    `<meta http-equiv="Content-Security-Policy" content="${policy}">`,
    '<meta name="viewport" content="width=device-width, initial-scale=1">',
    `<title>${escaped(title)}</title>`,
    `<style>${themeCss}\n${reportCss}</style>`,
    '</head>',
    `<body class="report-file">${copy.outerHTML}</body>`,
    '</html>',
    '',
  ].join('\n')
}
