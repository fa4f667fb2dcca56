import { describe, expect, it } from 'vitest'
import { overlap } from '../../web/canvas/geometry.ts'
import { boxesOf, placeLabels, placeTags } from '../../web/canvas/labelling.ts'
import type { Route } from '../../web/canvas/routing.ts'

const shapes = [{ arrangement: 'stacked' as const, size: { width: 60, height: 30 } }]
const tagShapes = [{ lines: 2, size: { width: 90, height: 30 } }]

describe('placeLabels', () => {
  const body = { x: 0, y: 0, width: 48, height: 32 }

  it('takes the side wished for where it is free', () => {
    const label = placeLabels([{ id: 'a', body, shapes, wish: ['top', 'bottom'], anchors: [] }], {
      bodies: [body],
      streams: [],
    }).get('a')
    expect(label && label.y + label.height).toBeLessThan(0)
  })

  it('covers neither a stream, nor a unit, nor another label', () => {
    const above: Route = [
      [24, -200],
      [24, 0],
    ]
    const neighbour = { x: 80, y: 0, width: 48, height: 32 }
    const requests = [body, neighbour].map((one, i) => ({
      id: String(i),
      body: one,
      shapes,
      wish: ['top', 'bottom', 'left', 'right'] as const,
      anchors: i === 0 ? [{ x: 24, y: 0, side: 'top' as const }] : [],
    }))
    const placed = [
      ...placeLabels(requests, {
        bodies: [body, neighbour],
        streams: [{ id: 's', route: above }],
      }).values(),
    ]
    expect(placed).toHaveLength(2)
    const [first, second] = placed
    expect(first && second && overlap(first, second)).toBe(false)
    for (const label of placed) {
      for (const other of [body, neighbour, ...boxesOf(above)]) {
        expect(overlap(label, other)).toBe(false)
      }
    }
  })

  it('stands within a symbol that has room, and beside one that has not', () => {
    const shell = { x: 0, y: 0, width: 96, height: 80 }
    const place = (room: boolean) =>
      placeLabels(
        [
          {
            id: 'a',
            body: shell,
            shapes,
            wish: ['top'],
            inside: () => (room ? [18, 25] : null),
            anchors: [],
          },
        ],
        { bodies: [shell], streams: [] },
      ).get('a')
    expect(place(true)).toMatchObject({ x: 18, y: 25, align: 'centre' })
    const beside = place(false)
    expect(beside && overlap(beside, shell)).toBe(false)
  })

  it('stays where it is while it covers nothing there', () => {
    const request = { id: 'a', body, shapes, wish: ['top', 'bottom'] as const, anchors: [] }
    const stands = {
      id: 'a',
      x: 0,
      y: 60,
      width: 60,
      height: 30,
      arrangement: 'stacked' as const,
      align: 'left' as const,
    }
    const staying = new Map([['a', stands]])
    const free = placeLabels([request], { bodies: [body], streams: [] }, staying)
    expect(free.get('a')).toBe(stands)
    const neighbour = { x: 10, y: 50, width: 48, height: 32 }
    const pushed = placeLabels([request], { bodies: [body, neighbour], streams: [] }, staying)
    expect(pushed.get('a')).not.toBe(stands)
  })
})

describe('placeTags', () => {
  const route: Route = [
    [0, 0],
    [200, 0],
  ]

  it('leads from the stream to a text that covers nothing', () => {
    const tag = placeTags(
      [{ id: 's', route, shapes: tagShapes }],
      { bodies: [], streams: [{ id: 's', route }] },
      [],
    ).get('s')
    expect(tag).toBeDefined()
    expect(tag?.leader[0]?.[1]).toBe(0)
    for (const box of boxesOf(route)) expect(tag && overlap(tag, box)).toBe(false)
  })

  it('leaves a tag out rather than covering something', () => {
    const wall = [
      { x: -200, y: -200, width: 600, height: 190 },
      { x: -200, y: 10, width: 600, height: 190 },
    ]
    const tags = placeTags(
      [{ id: 's', route, shapes: tagShapes }],
      { bodies: wall, streams: [{ id: 's', route }] },
      [],
    )
    expect(tags.size).toBe(0)
  })

  it('keeps two tags apart, leaders too', () => {
    const below: Route = [
      [0, 60],
      [200, 60],
    ]
    const tags = [
      ...placeTags(
        [
          { id: 'a', route, shapes: tagShapes },
          { id: 'b', route: below, shapes: tagShapes },
        ],
        {
          bodies: [],
          streams: [
            { id: 'a', route },
            { id: 'b', route: below },
          ],
        },
        [],
      ).values(),
    ]
    expect(tags).toHaveLength(2)
    const [a, b] = tags
    if (!a || !b) throw new Error('Both tags have room.')
    expect(overlap(a, b)).toBe(false)
    for (const box of boxesOf(a.leader, 0.5)) expect(overlap(box, b)).toBe(false)
    for (const box of boxesOf(b.leader, 0.5)) expect(overlap(box, a)).toBe(false)
  })
})
