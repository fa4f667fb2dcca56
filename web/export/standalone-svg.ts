/*
 * Drawings as files of their own: every style that the window's sheets give is written into the
 * elements, every colour as plain hexadecimal, text stays text.
 */

/** What decides how an SVG element looks, of what style sheets give. */
const properties = [
  'fill',
  'fill-opacity',
  'stroke',
  'stroke-width',
  'stroke-opacity',
  'stroke-dasharray',
  'stroke-linecap',
  'stroke-linejoin',
  'paint-order',
  'opacity',
  'stop-color',
  'stop-opacity',
] as const
const textProperties = [
  'font-family',
  'font-size',
  'font-weight',
  'text-anchor',
  'text-decoration-line',
] as const

/** What a property is when nothing says otherwise; not worth writing. */
const usual: Readonly<Record<string, string>> = {
  'fill-opacity': '1',
  'stroke-opacity': '1',
  'stop-opacity': '1',
  opacity: '1',
  stroke: 'none',
  'stroke-dasharray': 'none',
  'stroke-linecap': 'butt',
  'stroke-linejoin': 'miter',
  'paint-order': 'normal',
  'text-anchor': 'start',
  'font-weight': '400',
  'text-decoration-line': 'none',
}

const svgNamespace = 'http://www.w3.org/2000/svg'
const colours = new Map<string, string>()
let pixel: CanvasRenderingContext2D | null | undefined

/** A computed colour of any kind as #rrggbb; opacity apart it is kept, fully clear is none. */
function plainColour(value: string): { readonly colour: string; readonly opacity: number } {
  if (!/^(rgb|color|oklab|oklch|lab|lch|hsl)/.test(value)) return { colour: value, opacity: 1 }
  const known = colours.get(value)
  if (known) return split(known)
  pixel ??= Object.assign(document.createElement('canvas'), { width: 1, height: 1 }).getContext(
    '2d',
    { willReadFrequently: true },
  )
  if (!pixel) return { colour: value, opacity: 1 }
  pixel.clearRect(0, 0, 1, 1)
  pixel.fillStyle = value
  pixel.fillRect(0, 0, 1, 1)
  const [r = 0, g = 0, b = 0, a = 255] = pixel.getImageData(0, 0, 1, 1).data
  const hex = [r, g, b].map((part) => part.toString(16).padStart(2, '0')).join('')
  const text = `#${hex}/${a / 255}`
  colours.set(value, text)
  return split(text)
}

function split(text: string): { readonly colour: string; readonly opacity: number } {
  const [colour = '#000000', opacity = '1'] = text.split('/')
  return Number(opacity) === 0
    ? { colour: 'none', opacity: 1 }
    : { colour, opacity: Number(opacity) }
}

/** Calls `use` with a light sheet on the page, unseen, in which the window's styles hold. */
function onLightSheet<T>(classes: string, use: (sheet: HTMLElement) => T): T {
  const outer = document.createElement('div')
  outer.className = `light-sheet ${classes}`
  Object.assign(outer.style, { position: 'fixed', left: '-20000px', top: '0' })
  outer.setAttribute('aria-hidden', 'true')
  document.body.append(outer)
  try {
    return use(outer)
  } finally {
    outer.remove()
  }
}

export interface StandaloneOptions {
  /** Classes of what holds the drawing in the window, whose style sheets reach into it. */
  readonly within?: string
  /** Colour of the ground, #rrggbb; paper unless given, 'none' for none. */
  readonly ground?: string
  readonly title?: string
}

/** A drawing as the text of an SVG file, in the light colours whatever the window shows. */
export function standaloneSvg(source: SVGSVGElement, options: StandaloneOptions = {}): string {
  const { within = '', ground, title } = options
  const width = source.clientWidth || Number(source.getAttribute('width')) || 0
  const height = source.clientHeight || Number(source.getAttribute('height')) || 0
  return onLightSheet(within, (sheet) => {
    const copy = source.cloneNode(true) as SVGSVGElement
    sheet.append(copy)
    const paper = ground ?? getComputedStyle(sheet).getPropertyValue('--paper').trim()
    const elements = [copy, ...copy.querySelectorAll<SVGElement>('*')]
    // All styles are read before any is written: writing would change what later ones inherit.
    const styles = elements.map(styleOf)
    elements.forEach((element, i) => {
      for (const name of element.getAttributeNames()) {
        if (/^(class|style|tabindex|role|data-|aria-|on)/.test(name)) element.removeAttribute(name)
      }
      for (const [name, value] of styles[i] ?? []) element.setAttribute(name, value)
    })
    for (const element of elements) if (element.hasAttribute(hidden)) element.remove()
    copy.setAttribute('xmlns', svgNamespace)
    copy.setAttribute('width', String(width))
    copy.setAttribute('height', String(height))
    if (!copy.getAttribute('viewBox')) copy.setAttribute('viewBox', `0 0 ${width} ${height}`)
    if (title) {
      const words = document.createElementNS(svgNamespace, 'title')
      words.textContent = title
      copy.prepend(words)
    }
    const { colour } = plainColour(paper)
    if (colour !== 'none') {
      const box = copy.viewBox.baseVal
      const back = document.createElementNS(svgNamespace, 'rect')
      for (const [name, value] of Object.entries({
        x: box.x,
        y: box.y,
        width: box.width,
        height: box.height,
        fill: colour,
      })) {
        back.setAttribute(name, String(value))
      }
      copy.prepend(back)
    }
    return new XMLSerializer().serializeToString(copy)
  })
}

/** Mark of elements that style sheets hide. */
const hidden = 'data-hidden'

function styleOf(element: SVGElement): readonly (readonly [string, string])[] {
  const style = getComputedStyle(element)
  if (style.display === 'none' && element.tagName !== 'defs') return [[hidden, '']]
  const isText = element.tagName === 'text' || element.tagName === 'tspan'
  const isStop = element.tagName === 'stop'
  const written: [string, string][] = []
  if (['svg', 'g', 'defs', 'clipPath', 'linearGradient', 'title'].includes(element.tagName)) {
    const opacity = style.getPropertyValue('opacity')
    return opacity !== '' && opacity !== '1' ? [['opacity', opacity]] : []
  }
  for (const name of isText ? [...properties, ...textProperties] : properties) {
    if (isStop !== name.startsWith('stop-') && name !== 'opacity') continue
    let value = style.getPropertyValue(name).trim()
    if (value === '' || value === usual[name]) continue
    if (name === 'fill' || name === 'stroke' || name === 'stop-color') {
      if (value.startsWith('url(')) {
        // The address of the page before the mark is of no use elsewhere.
        value = value.replace(/^url\(["']?[^#]*(#[^"')]+)["']?\).*$/, 'url($1)')
      } else {
        const { colour, opacity } = plainColour(value)
        value = colour
        if (opacity < 1) {
          const part = name === 'stop-color' ? 'stop-opacity' : `${name}-opacity`
          written.push([part, String(Math.round(opacity * 1000) / 1000)])
        }
        if (name === 'stroke' && value === 'none') continue
      }
    } else if (name === 'text-decoration-line') {
      // Dots are more than most readers of such files know.
      written.push(['text-decoration', value])
      continue
    } else if (name.endsWith('width') || name === 'font-size') value = value.replace(/px$/, '')
    else if (name === 'stroke-dasharray') value = value.replaceAll('px', '')
    if (name.startsWith('stroke-') && style.getPropertyValue('stroke') === 'none') continue
    written.push([name, value])
  }
  return written
}

/** A drawing as a PNG, `scale` pixels to one of the drawing's. */
export async function pngOf(svg: string, scale = 2): Promise<Blob> {
  const image = new Image()
  const address = URL.createObjectURL(new Blob([svg], { type: 'image/svg+xml;charset=utf-8' }))
  try {
    await new Promise<void>((resolve, reject) => {
      image.onload = () => resolve()
      image.onerror = () => reject(new Error('The drawing could not be turned into a picture.'))
      image.src = address
    })
    const canvas = document.createElement('canvas')
    canvas.width = Math.round(image.naturalWidth * scale)
    canvas.height = Math.round(image.naturalHeight * scale)
    const context = canvas.getContext('2d')
    if (!context) throw new Error('The browser gives no canvas to draw the picture on.')
    context.drawImage(image, 0, 0, canvas.width, canvas.height)
    const blob = await new Promise<Blob | null>((resolve) => canvas.toBlob(resolve, 'image/png'))
    if (!blob) throw new Error('The picture is too large for this browser.')
    return blob
  } finally {
    URL.revokeObjectURL(address)
  }
}
