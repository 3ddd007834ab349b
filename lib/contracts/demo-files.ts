/** A table that people may download in the demo and upload again. */
export interface DemoFile {
  readonly name: string;
  /** Date of the night that it belongs to; null for the night in progress. */
  readonly night: string | null;
  readonly about: string;
}

/** Names of the samples that are made for the night in progress when the demo is loaded. */
export const tonightFiles = {
  standards: 'tonight-standards.csv',
  targets: 'tonight-targets.csv',
  newFrames: 'tonight-new-frames.csv',
} as const;

/** Every sample of the demo. What is not named here is not given out. */
export const demoFiles: readonly DemoFile[] = [
  {
    name: tonightFiles.standards,
    night: null,
    about: 'Standard stars on the frames that are in the log. To be taken without a fault.',
  },
  {
    name: tonightFiles.newFrames,
    night: null,
    about:
      'Standard stars on the frames that the log misses; the table says itself when and how they were taken, and uploading it puts them into the log.',
  },
  {
    name: tonightFiles.targets,
    night: null,
    about: 'Stars of the programmes’ targets, named and with positions.',
  },
  {
    name: '2026-10-17-standards.csv',
    night: '2026-10-17',
    about: 'Standard stars of a night that is calibrated. It is uploaded already.',
  },
  {
    name: '2026-10-17-targets.csv',
    night: '2026-10-17',
    about: 'Programme stars of the calibrated night. It is uploaded already.',
  },
  {
    name: '2026-11-03-standards.csv',
    night: '2026-11-03',
    about: 'Standard stars in five bands. It is uploaded already: a second time it is recognised.',
  },
  {
    name: '2026-11-03-targets.csv',
    night: '2026-11-03',
    about: 'Stars of all three programmes, 17,000 rows. It is uploaded already.',
  },
  {
    name: '2026-11-03-standards-faulty.csv',
    night: '2026-11-03',
    about: 'More than a dozen kinds of faults, each in a line of its own: to see how a table is refused.',
  },
  {
    name: '2026-11-03-standards-misidentified.csv',
    night: '2026-11-03',
    about:
      'A table without faults in which one star was mistaken for its neighbour: for the calibration to find.',
  },
  {
    name: '2026-11-03-standards-other-headers.csv',
    night: '2026-11-03',
    about: 'The same stars under other column names, with sexagesimal positions: for the mapping of columns.',
  },
  {
    name: '2026-11-08-standards.csv',
    night: '2026-11-08',
    about:
      'Standard stars of the cloudy night, one of them mistaken for its neighbour. It is uploaded already.',
  },
  {
    name: '2026-11-08-targets.csv',
    night: '2026-11-08',
    about: 'Programme stars of the cloudy night, not uploaded yet.',
  },
];
