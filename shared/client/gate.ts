import { can, leastRoleWith, roles, type Capability } from '@/shared/contract/roles';
import { usePeople } from './people';
import { useCan } from './session';

export interface Gate {
  may: boolean;
  /** 'a foreman or a manager': who can, for the screen that says no. */
  roles: string;
  /** Their names in this workshop. */
  people: string[];
}

/** Whether the person may, and who can where not. The server checks again. */
export function useGate(capability: Capability): Gate {
  const may = useCan(capability);
  const people = usePeople().data ?? [];
  const able = roles.slice(roles.indexOf(leastRoleWith(capability)));
  return {
    may,
    roles: able.map((role) => `a ${role}`).join(' or '),
    people: people.filter((person) => !person.disabled && can(person.role, capability)).map(({ name }) => name),
  };
}
