declare module 'smtp-server' {
  import type { Server } from 'node:net';
  import type { Readable } from 'node:stream';

  interface Envelope {
    mailFrom: { address: string } | false;
    rcptTo: { address: string }[];
  }
  interface Options {
    authOptional: boolean;
    disabledCommands: string[];
    logger: boolean;
    onData(
      stream: Readable,
      session: { envelope: Envelope },
      done: (error?: Error | null) => void,
    ): void;
  }
  export class SMTPServer {
    constructor(options: Options);
    listen(port: number, host: string, ready: () => void): Server;
    close(done: () => void): void;
  }
}
