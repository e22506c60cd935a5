import { Loading } from '#client/components/loading.tsx';
import { AppFrame } from '../app-frame.tsx';

export function CheckPage() {
  return (
    <AppFrame trail={[]}>
      <Loading />
    </AppFrame>
  );
}
