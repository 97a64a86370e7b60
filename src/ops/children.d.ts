import type { ChildProcess } from 'node:child_process';

export function ended(child: ChildProcess): Promise<number | null>;
export function stopChild(child: ChildProcess, limitMilliseconds: number): Promise<void>;
