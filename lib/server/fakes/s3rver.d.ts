// The package brings no types; only what is used here.
declare module "s3rver" {
  interface S3rverOptions {
    address: string;
    port: number;
    directory: string;
    silent: boolean;
    resetOnClose: boolean;
    configureBuckets: { name: string; configs: string[] }[];
  }
  export default class S3rver {
    constructor(options: S3rverOptions);
    run(): Promise<{ address: string; port: number }>;
    close(): Promise<void>;
  }
}
