import { Checkbox } from '@/app/_components/ui/checkbox';
import { observatoryRoles, type ObservatoryRole } from '@/lib/contracts/roles';

const what: Readonly<Record<ObservatoryRole, string>> = {
  manager: 'people, programmes, equipment, settings, every record',
  photometrist: 'fits, judges and approves calibrations; equipment',
  observer: 'opens nights and logs them',
};

interface RoleTicksProps {
  readonly checked: readonly ObservatoryRole[];
  readonly error: string | undefined;
}

export function RoleTicks({ checked, error }: RoleTicksProps) {
  return (
    <fieldset className="grid gap-1">
      <legend className="mb-0.5 text-small text-ink-2">Roles (none for investigators only)</legend>
      {observatoryRoles.map((role) => (
        <Checkbox
          key={role}
          name="roles"
          value={role}
          label={role}
          hint={what[role]}
          defaultChecked={checked.includes(role)}
        />
      ))}
      {error === undefined ? null : <p className="text-small font-medium text-bad">✕ {error}</p>}
    </fieldset>
  );
}
