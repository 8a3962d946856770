/** Cautions that go with what a finding asks people to touch. Common practice and machinery-safety advice; the manual rules. */
export const CAUTIONS = {
  underMachine:
    "Lower the machine or lock and block it, stop the engine and take the key before reaching under it; discs cut.",
  hydraulics:
    "Downforce hydraulics can hold pressure with the engine off: relieve it first, and never feel for a leak with a hand.",
  ballast:
    "Ballast is a heavy lift: use rated mounts, and check hitch, tyre, axle and road limits in the manual before adding any.",
  digging: "Dig behind the machine only with the operator stopped, parked and in eye contact.",
} as const;
