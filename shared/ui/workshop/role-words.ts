import type { Role } from '@/shared/contract/roles';

export const roleWords: Readonly<Record<Role, { title: string; meaning: string }>> = {
  technician: { title: 'Technician', meaning: 'plans, clips on, logs, checks' },
  foreman: { title: 'Foreman', meaning: 'also gives out channels and people, approves walls' },
  manager: { title: 'Manager', meaning: 'also people, equipment, limits' },
};
