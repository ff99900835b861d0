import type { Member } from '../deps';
import type { Role } from '@/shared/contract/roles';
import { demoWorkshopId } from './demo-workshop';

export interface DemoPerson {
  id: string;
  name: string;
  email: string;
  role: Role;
  /** Minutes ago that the person was seen. */
  seenMin: number;
}

const person = (name: string, role: Role, seenMin: number): DemoPerson => {
  const first = name.split(' ')[0]!.toLowerCase();
  return { id: `demo-${first}`, name, email: `${first}@harbourlane.example.com`, role, seenMin };
};

/** Invented people; the first of each role is who the one-tap sign-in opens. */
export const demoPeople = {
  petra: person('Petra Aldwin', 'manager', 92),
  hella: person('Hella Brandt', 'foreman', 1),
  ines: person('Ines Marlow', 'technician', 2),
  bram: person('Bram Teal', 'technician', 6),
  suri: person('Suri Vance', 'technician', 13),
  marek: person('Marek Holt', 'technician', 37),
} as const;
export type DemoName = keyof typeof demoPeople;

/** Who has joined is asked for by this address; the invitation is still open. */
export const invitedEmail = 'nell@harbourlane.example.com';

/** A person as the services know who asks. */
export const memberOf = (name: DemoName): Member => {
  const { id, role, name: fullName } = demoPeople[name];
  return { workshopId: demoWorkshopId, personId: id, sessionId: 'demo-seed', name: fullName, role };
};
