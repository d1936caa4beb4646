/** A product of the harden run: started when the first row needs it, stopped at the end. */
export interface RunningProduct {
  address: string;
  databaseUrl: string;
  /** Its data folder, with the sign-ins that the seed wrote. */
  folder: string;
  /** Number of the process that leads a service's group; services are web and worker. */
  pidOf(service: 'web' | 'worker'): number;
}

export interface Bench {
  /** The project's folder. */
  root: string;
  /** Where the bundles of this run lie, relative to the project. */
  bundleFolder: string;
  /** An empty folder for what the row writes. */
  folder: string;
  product(): Promise<RunningProduct>;
  /** One line of news while a row runs. */
  say(line: string): void;
}

export interface Measured {
  isMet: boolean;
  /** The figures in one line. */
  figure: string;
  /** The same as numbers and words, for `--json`. */
  details: Record<string, unknown>;
  /** What a person needs who wants to mend what was missed. */
  notes?: string[];
}

/** One row of the plan that runs on demand; its file in `rows/` exports it as `row`. */
export interface Row {
  /** Short, as it is given on the command line. */
  name: string;
  what: string;
  goal: string;
  measure(bench: Bench): Promise<Measured>;
}
