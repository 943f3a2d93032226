export interface Service {
  readonly url: string;
  readonly databaseUrl: string;
  readonly folder: string;
  readonly storeDir: string;
  readonly webPid: number;
  readonly workerPid: number;
  readonly log: string;
  replaceWorker(): Promise<void>;
  stop(): Promise<void>;
}

export declare function startService(options: {
  adminUrl: string;
  env?: Readonly<Record<string, string>>;
  seed?: string | null;
}): Promise<Service>;

export type SignedInFetch = ((path: string, init?: RequestInit) => Promise<Response>) & {
  headers(): Record<string, string>;
};

export declare function signIn(url: string, email: string, password: string): Promise<SignedInFetch>;
