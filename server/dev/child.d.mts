export type RunningServer = {
  readonly address: string;
  readonly ended: Promise<number | null>;
  output(): string;
  stop(): Promise<void>;
};
export function runToEnd(file: string, env: Record<string, string>): Promise<string>;
export function startServer(env: Record<string, string>, options?: { show?: boolean }): Promise<RunningServer>;
