import { Component, type ReactNode } from 'react';

/** Keeps a fault of the program inside one part of the page: the others go on, and this part can be tried again. */
export class Boundary extends Component<
  { readonly part: string; readonly children: ReactNode },
  { fault: string | null }
> {
  override state = { fault: null as string | null };

  static getDerivedStateFromError(thrown: unknown): { fault: string } {
    return { fault: thrown instanceof Error ? thrown.message : String(thrown) };
  }

  override render(): ReactNode {
    const { fault } = this.state;
    if (fault === null) return this.props.children;
    return (
      <div className="boundary" role="alert">
        <p>
          <strong>{this.props.part} cannot be shown: a fault of Fillcast itself.</strong> The matrix and the other parts
          of the page are untouched.
        </p>
        <p className="small figure">{fault}</p>
        <button type="button" onClick={() => this.setState({ fault: null })}>
          Try again
        </button>
      </div>
    );
  }
}
