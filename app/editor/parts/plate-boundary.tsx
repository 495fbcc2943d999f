import { Component, type ReactNode } from "react";

interface Props {
  /** When it changes, drawing is tried again. */
  readonly sign: string;
  readonly title: string;
  readonly children: ReactNode;
}

interface State {
  readonly sign: string;
  readonly fault: string | null;
}

/** A plate that cannot be drawn says so in its place; the sheet goes on. */
export class PlateBoundary extends Component<Props, State> {
  override state: State = { sign: this.props.sign, fault: null };

  static getDerivedStateFromError(error: unknown): Partial<State> {
    return { fault: error instanceof Error ? error.message : String(error) };
  }

  static getDerivedStateFromProps(props: Props, state: State): Partial<State> | null {
    return props.sign === state.sign ? null : { sign: props.sign, fault: null };
  }

  override render(): ReactNode {
    if (this.state.fault === null) return this.props.children;
    return <PlateFault title={this.props.title} fault={this.state.fault} />;
  }
}

/** Said in the place of a plate that cannot be drawn. */
export function PlateFault({ title, fault }: { readonly title: string; readonly fault: string }) {
  return (
    <p className="hl-gloss hl-gloss-error">
      <b aria-hidden="true">‡ </b>
      {title} cannot be drawn: {fault.replace(/\.$/, "")}. Its result is kept; its working may be edited.
    </p>
  );
}
