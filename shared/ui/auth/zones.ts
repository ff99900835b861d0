/** Zones the device knows, its own first where the list lacks it. */
export function knownZones(own: string): string[] {
  const list = (Intl as { supportedValuesOf?: (key: 'timeZone') => string[] }).supportedValuesOf?.('timeZone') ?? [
    'UTC',
  ];
  const all = list.includes('UTC') ? list : [...list, 'UTC'];
  return all.includes(own) ? all : [own, ...all];
}
