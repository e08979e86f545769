/** Where the rules are written, named for what each covers; the list is an aid and never complete. */
export interface SafetyReference {
  readonly name: string;
  readonly covers: string;
}

/** @source names and coverage from memory; the edition in force and local law decide */
export const safetyReferences: readonly SafetyReference[] = [
  { name: 'IEC 61010-1', covers: 'electrical equipment for measurement, control and laboratory use' },
  { name: 'IEC 61010-031', covers: 'hand-held probes for electrical test and measurement' },
  {
    name: 'IEC 60204-1, ISO 13849',
    covers: 'electrical equipment of machines; interlocks and control systems',
  },
  { name: 'NFPA 70E', covers: 'electrical safety in the workplace (United States)' },
  { name: 'IEC 60479', covers: 'effects of current on people' },
  { name: 'IEC 62471', covers: 'photobiological safety of lamps' },
  { name: 'ICNIRP guidelines', covers: 'limits of exposure to ultraviolet and to radio frequency' },
  { name: 'ISO/TR 15916, NFPA 2', covers: 'safety of hydrogen systems; hydrogen technologies' },
  { name: 'IEC 60079', covers: 'equipment in explosive atmospheres' },
  { name: 'ISO 7010 (W012, W027)', covers: 'warning signs for electricity and optical radiation' },
];
