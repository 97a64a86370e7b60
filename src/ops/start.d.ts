import type { ChildProcess } from 'node:child_process';

type Environment = Record<string, string | undefined>;

export function checkPort(host: string, port: number): Promise<void>;
/** Sets MAIL_CATCHER_PORT where the demo catches its e-mail, and takes it away everywhere else. */
export function chooseCatcher(environment: Environment): Promise<void>;
/** `child` is the process that runs at this moment. */
export function keepRunning(
  name: string,
  file: string,
  environment: Environment,
  isStopping: () => boolean,
): { child: ChildProcess };
