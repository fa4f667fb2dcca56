import { Component, type ReactNode } from 'react'
import { Mark } from './number/Mark.tsx'

interface Props {
  /** What it is that stopped: 'The chart'. */
  readonly name: string
  readonly children: ReactNode
}

/** Keeps a fault in one part of the window from taking the others, and the plant, with it. */
export class Guard extends Component<Props, { readonly fault: string | null }> {
  override state = { fault: null as string | null }

  static getDerivedStateFromError(error: unknown): { fault: string } {
    return { fault: error instanceof Error ? error.message : String(error) }
  }

  override render(): ReactNode {
    if (this.state.fault === null) return this.props.children
    return (
      <div className="guard" role="alert">
        <p>
          <Mark name="error" /> <strong>{this.props.name} stopped.</strong> The plant is not
          touched. Undo the last edit if it goes on stopping.
        </p>
        <p className="muted">{this.state.fault}</p>
        <button type="button" className="button" onClick={() => this.setState({ fault: null })}>
          Try again
        </button>
      </div>
    )
  }
}
