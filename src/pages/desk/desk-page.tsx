import { Loading } from '#client/components/loading.tsx';
import { AppFrame } from '../app-frame.tsx';

export function DeskPage() {
  return (
    <AppFrame trail={[]}>
      <Loading />
    </AppFrame>
  );
}
