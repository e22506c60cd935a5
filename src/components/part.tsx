import { QueryErrorResetBoundary } from '@tanstack/react-query';
import { Component, type ReactNode, Suspense } from 'react';
import { onSignInMoment } from '#client/lib/sign-in-state.ts';
import { problemText } from '#client/text/problems.ts';
import { Button } from './button.tsx';
import { Loading } from './loading.tsx';
import { ProblemNote } from './problem-note.tsx';

/** A part of a page that loads and fails by itself, so that the rest of the page can be used. */
export function Part({ children }: { children: ReactNode }) {
  return (
    <QueryErrorResetBoundary>
      {({ reset }) => (
        <PartBoundary onReset={reset}>
          <Suspense fallback={<Loading />}>{children}</Suspense>
        </PartBoundary>
      )}
    </QueryErrorResetBoundary>
  );
}

interface PartBoundaryProps {
  onReset: () => void;
  children: ReactNode;
}

class PartBoundary extends Component<PartBoundaryProps, { error: unknown }> {
  override state: { error: unknown } = { error: null };
  private stopListening = () => {};

  static getDerivedStateFromError(error: unknown) {
    return { error };
  }

  override componentDidMount() {
    // What failed because the session had ended is tried again once somebody has signed in.
    this.stopListening = onSignInMoment((moment) => {
      if (moment === 'signedIn' && this.state.error) this.reset();
    });
  }

  override componentWillUnmount() {
    this.stopListening();
  }

  private reset = () => {
    this.props.onReset();
    this.setState({ error: null });
  };

  override render() {
    if (!this.state.error) return this.props.children;
    return (
      <div className="p-3.5">
        <ProblemNote error={this.state.error}>
          <Button look="quiet" className="mt-2" onClick={this.reset}>
            {problemText.tryAgain}
          </Button>
        </ProblemNote>
      </div>
    );
  }
}
