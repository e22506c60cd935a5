import { ButtonLink } from '#client/components/button.tsx';
import { PublicLayout } from '#client/layouts/public-layout.tsx';
import { paths } from '#client/lib/paths.ts';
import { problemText as text } from '#client/text/problems.ts';

export function NotFoundPage() {
  return (
    <PublicLayout title={text.notFoundTitle}>
      <p className="mb-2">{text.notFound}</p>
      <p className="mb-4">{text.askForPart}</p>
      <ButtonLink look="main" to={paths.dams}>
        {text.toDams}
      </ButtonLink>
    </PublicLayout>
  );
}
