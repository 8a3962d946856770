import { ROLES, type Role } from "@/lib/access/permissions";

export interface RoleSelectProps {
  role: Role;
  label: string;
  onChange: (role: Role) => void;
}

export function RoleSelect({ role, label, onChange }: RoleSelectProps) {
  return (
    <select
      aria-label={label}
      value={role}
      onChange={(event) => {
        const chosen = ROLES.find((candidate) => candidate === event.target.value);
        if (chosen) onChange(chosen);
      }}
      className="min-h-11 rounded border border-edge bg-sheet px-2 md:min-h-8"
    >
      {ROLES.map((name) => (
        <option key={name} value={name}>
          {name}
        </option>
      ))}
    </select>
  );
}
