export interface Clock {
  now(): Date;
}
