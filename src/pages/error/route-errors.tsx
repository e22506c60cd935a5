import { Component, type ReactNode } from 'react';
import { type Location, useLocation } from 'react-router-dom';
import { RouteError } from './route-error.tsx';

/** Shows what failed in place of a page; going anywhere, or coming to the same address again, takes it away. */
export function RouteErrors({ children }: { children: ReactNode }) {
  return <Boundary location={useLocation()}>{children}</Boundary>;
}

type BoundaryProps = { location: Location; children: ReactNode };
type Failure = { readonly failed: { readonly error: unknown } | null; readonly at: Location };

/** React catches what a page throws in classes only. */
class Boundary extends Component<BoundaryProps, Failure> {
  override state: Failure = { failed: null, at: this.props.location };

  static getDerivedStateFromError(error: unknown): Partial<Failure> {
    return { failed: { error } };
  }

  static getDerivedStateFromProps({ location }: BoundaryProps, { at }: Failure): Partial<Failure> | null {
    return location === at ? null : { failed: null, at: location };
  }

  override render(): ReactNode {
    const { failed } = this.state;
    return failed === null ? this.props.children : <RouteError error={failed.error} />;
  }
}
