import { CheckField } from '#client/components/field.tsx';
import { damsText as text } from '#client/text/dams.ts';
import type { DamRole } from '#shared/contract/actions.ts';

const ROLES: readonly DamRole[] = ['engineer', 'reviewer', 'colleague'];

interface RoleChecksProps {
  legend: string;
  roles: readonly DamRole[];
  onChange: (roles: DamRole[]) => void;
  /** Say beside each part what it may do. */
  explained?: boolean;
}

/** The parts on a dam are a set: any of them together. */
export function RoleChecks({ legend, roles, onChange, explained = false }: RoleChecksProps) {
  const toggle = (role: DamRole, on: boolean) =>
    onChange(ROLES.filter((each) => (each === role ? on : roles.includes(each))));
  return (
    <fieldset className={explained ? 'flex flex-col gap-1.5' : 'flex flex-wrap gap-x-4 gap-y-1'}>
      <legend className={explained ? 'mb-1 text-sm font-semibold' : 'sr-only'}>{legend}</legend>
      {ROLES.map((role) => (
        <CheckField
          key={role}
          label={text.role(role)}
          hint={explained ? text.roleTask(role) : null}
          checked={roles.includes(role)}
          onChange={(event) => toggle(role, event.target.checked)}
        />
      ))}
    </fieldset>
  );
}
