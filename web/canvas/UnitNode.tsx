import { memo } from 'react'
import { Handle, type NodeProps, Position } from 'reactflow'
import { useSelectionStore } from '../store/selection-store.ts'
import { useCanvasStore } from './canvas-store.ts'
import { useConnectingStore } from './connecting-store.ts'
import { grown } from './geometry.ts'
import { Ports } from './Ports.tsx'
import { usePinStore } from './pin-store.ts'
import { UnitName } from './spoken-names.tsx'
import { UnitSymbol } from './UnitSymbol.tsx'

/** A unit: its symbol, the frame of selection, and its ports while they are wanted. */
export const UnitNode = memo(function UnitNode({ id }: NodeProps) {
  const unit = useCanvasStore((state) => state.sheet.units.get(id))
  const selected = useSelectionStore((state) => state.selected.includes(id))
  const hovered = useSelectionStore((state) => state.hovered === id)
  const connecting = useConnectingStore(
    (state) => state.connecting !== null || state.choosing?.unit === id,
  )
  const pinned = usePinStore((state) => state.pinned.has(id))
  if (!unit) return null
  const { size, body, at } = unit
  const frame = grown(
    { x: body.x - at[0], y: body.y - at[1], width: body.width, height: body.height },
    4,
  )
  return (
    <>
      <svg className="unit" width={size.width} height={size.height} aria-hidden="true">
        {(selected || hovered) && (
          <rect
            className={selected ? 'unit-frame unit-frame-selected' : 'unit-frame'}
            {...frame}
            rx={3}
          />
        )}
        {/* Takes hold of thin symbols too. */}
        <rect className="unit-grip" {...frame} />
        <UnitSymbol
          kind={unit.kind}
          form={unit.form}
          mirrored={unit.mirrored}
          upended={unit.upended}
        />
        {pinned && (selected || hovered) && (
          <path
            className="unit-pin"
            d={`M${frame.x - 3} ${frame.y - 3}m-2.5 -4.5h5l-1 4h2v1.5h-3v4h-1v-4h-3v-1.5h2z`}
          />
        )}
        {(selected || hovered || connecting) && <Ports unit={unit} />}
      </svg>
      <UnitName id={id} kind={unit.kind} label={unit.label} />
      <Handle className="unseen" type="source" position={Position.Right} isConnectable={false} />
      <Handle className="unseen" type="target" position={Position.Left} isConnectable={false} />
    </>
  )
})
