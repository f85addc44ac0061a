/** What every reader of an answer about a machine must see, whatever the numbers say. */
export const cautions = [
  {
    code: "lock_out",
    text: "Lock out and prove dead before anybody reaches in: stored energy and rotating parts kill.",
  },
  {
    code: "lifting",
    text: "Lift and jack by an approved plan, with rated gear. Never work under a load that is not held by packing.",
  },
  {
    code: "maker_limits",
    text: "The machine maker's limits, torque values and clearances come before these numbers, and so do local codes.",
  },
  {
    code: "laser_light",
    text: "A laser in use bears its class by IEC 60825-1. Keep to it, and keep eyes out of the beam.",
  },
  {
    code: "engineer_decides",
    text: "This is a computation, not an authorisation. A qualified engineer decides whether and how a part is moved.",
  },
] as const;
