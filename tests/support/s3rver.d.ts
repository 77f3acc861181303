/** The part of the S3 fake that the tests use: it brings no types of its own. */
declare module 's3rver' {
  export default class S3rver {
    constructor(options: {
      address: string;
      port: number;
      directory: string;
      silent: boolean;
      configureBuckets: { name: string; configs: never[] }[];
    });
    run(): Promise<{ address: string; port: number }>;
    close(): Promise<void>;
  }
}
