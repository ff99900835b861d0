/** The parts of the workshop's settings, in their order. */
export const sections = [
  { key: 'people', title: 'People', meaning: 'Roles, invitations, links for a new password' },
  { key: 'staffing', title: 'Hours of people', meaning: 'Own hours, breaks, days off, skills' },
  { key: 'skills', title: 'Skills', meaning: 'What other work may ask for' },
  { key: 'places', title: 'Places', meaning: 'Bays and benches where work is done' },
  { key: 'chargers', title: 'Chargers', meaning: 'Channels, what they give, who holds them now' },
  { key: 'module-types', title: 'Module types', meaning: 'Chemistry, limits of the maker, resistance' },
  { key: 'pack-types', title: 'Pack types', meaning: 'Groups, modules, and which group sits where' },
  { key: 'meters', title: 'Meters', meaning: 'Offset and last cross-check' },
  { key: 'resistors', title: 'Levelling resistors', meaning: 'For pre-levelling and neighbours' },
  { key: 'limits', title: 'Limits', meaning: 'Tolerance, rest, look-ins, fit, inrush, who decides' },
  { key: 'hours', title: 'Name and hours', meaning: 'Name, time zone, working hours' },
  { key: 'walls', title: 'Walls', meaning: 'Screens that show the board' },
  { key: 'server', title: 'Server', meaning: 'Version, copies of the data, export of everything' },
] as const;

export type SectionKey = (typeof sections)[number]['key'];

export const isSection = (key: string | undefined): key is SectionKey =>
  sections.some((section) => section.key === key);
