export { nameOfSetting as nameOfField } from '../../../settings/names.ts';

const flightOfPart: Readonly<Record<string, FlightId>> = {
  source: 'shape',
  level: 'quantise',
  table: 'quantise',
};

export type FlightId = 'shape' | 'quantise' | 'output' | 'export';

/** The flight that a field stands in; `null` where it stands above them all. */
export function flightOfField(path: string): FlightId | null {
  return flightOfPart[/^\w+/.exec(path)?.[0] ?? ''] ?? null;
}
