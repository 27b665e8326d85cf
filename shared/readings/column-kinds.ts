/** The columns of a file of steady readings: what they are called and in which units they may be. */
export const columnKinds = {
  time: { name: 'time', units: ['s'] },
  power: { name: 'heater power', units: ['W'] },
  wallTemperature: { name: 'wall temperature', units: ['K'] },
  bulkTemperature: { name: 'bulk temperature', units: ['K'] },
  flow: { name: 'flow', units: ['m/s', 'm^3/s'] },
} as const;
export type ColumnKey = keyof typeof columnKinds;
