import type { ReactNode } from 'react';
import { Component } from 'react';
import { FailedFace } from './faces.tsx';

export interface ErrorBoundaryProps {
  /** A change of this value clears the failure: pass the address. */
  resetKey?: string;
  children: ReactNode;
}

interface State {
  error: unknown;
  hasFailed: boolean;
  resetKey: string | undefined;
}

/** Keeps a failure of one part from taking the page with it. */
export class ErrorBoundary extends Component<ErrorBoundaryProps, State> {
  override state: State = { error: null, hasFailed: false, resetKey: this.props.resetKey };

  static getDerivedStateFromError(error: unknown): Partial<State> {
    return { error, hasFailed: true };
  }

  static getDerivedStateFromProps(props: ErrorBoundaryProps, state: State): Partial<State> | null {
    if (props.resetKey === state.resetKey) return null;
    return { error: null, hasFailed: false, resetKey: props.resetKey };
  }

  override render(): ReactNode {
    if (!this.state.hasFailed) return this.props.children;
    return (
      <FailedFace
        title="This part of the page failed."
        error={this.state.error}
        onRetry={() => this.setState({ error: null, hasFailed: false })}
      >
        Nothing was changed by it. Try again, or reload the page.
      </FailedFace>
    );
  }
}
