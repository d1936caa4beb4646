/** A product of the harden run: started when the first row needs it, stopped at the end. */
export interface RunningProduct {
  address: string;
  databaseUrl: string;
  /** Its data folder, with the sign-ins that the seed wrote. */
  folder: string;
  /** Number of the process that leads a service's group; services are web and worker. */
  pidOf(service: 'web' | 'worker'): number;
}

export interface LaboratoryOptions {
  /** Worker processes of one thread each. */
  workers: number;
  web: boolean;
  /** Where its database lies, when not in the laboratory's folder. */
  database?: string;
  /** Settings of the database server beside the usual ones. */
  settings?: Record<string, string>;
}

/** An empty laboratory of the row's own, whose processes it may kill. */
export interface Laboratory {
  address: string;
  databaseUrl: string;
  folder: string;
  /** Services are postgres, web, worker-1, worker-2 … */
  pidOf(service: string): number;
  /** False between the end of a service and its next start. */
  isRunning(service: string): boolean;
  /** @returns the name of one more worker */
  addWorker(threads?: number): Promise<string>;
  /** kill -9, by number; it is started again by itself. @returns whether it was alive */
  kill(service: string): Promise<boolean>;
  isDatabaseUp(): Promise<boolean>;
  /** Stops everything. @returns how many pages of the database have a wrong checksum */
  stopAndCheck(): Promise<number>;
  close(): Promise<void>;
}

export interface Bench {
  /** The project's folder. */
  root: string;
  /** Where the bundles of this run lie, relative to the project. */
  bundleFolder: string;
  /** An empty folder for what the row writes. */
  folder: string;
  product(): Promise<RunningProduct>;
  /** One of its own; it is closed with the row. One at a time. */
  laboratory(options: LaboratoryOptions): Promise<Laboratory>;
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
  /** Measured on the demonstration as it is, before rows that add to it. */
  isFirst?: boolean;
  measure(bench: Bench): Promise<Measured>;
}
