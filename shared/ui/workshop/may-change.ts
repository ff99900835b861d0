const list = (names: readonly string[]): string =>
  names.length > 1 ? `${names.slice(0, -1).join(', ')} or ${names.at(-1)}` : (names[0] ?? '');

/** 'Changed by a manager. Here that is Petra Aldwin.' */
export const whoMay = (
  gate: { may: boolean; roles: string; people: readonly string[] },
  act = 'Changed',
): string | null =>
  gate.may ? null : `${act} by ${gate.roles}.${gate.people.length > 0 ? ` Here that is ${list(gate.people)}.` : ''}`;
