import { Component, type ReactNode } from 'react';
import { Failed } from './query-states';

interface ErrorBoundaryProps {
  children: ReactNode;
  /** A new value gives the region another chance: the path of the page, say. */
  resetKey?: string;
}

/** Keeps a fault in one region from taking the page with it. */
export class ErrorBoundary extends Component<ErrorBoundaryProps, { error: Error | null }> {
  override state: { error: Error | null } = { error: null };

  static getDerivedStateFromError(error: Error) {
    return { error };
  }

  override componentDidUpdate(before: ErrorBoundaryProps): void {
    if (before.resetKey !== this.props.resetKey && this.state.error) this.setState({ error: null });
  }

  override render(): ReactNode {
    const { error } = this.state;
    if (!error) return this.props.children;
    return <Failed error={error} retry={() => this.setState({ error: null })} />;
  }
}
