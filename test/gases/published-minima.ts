/** Published minima of the breakdown voltage, V at pd [V, Torr cm], with source and status.
 *
 *  NK: Naidu and Kamaraju, High Voltage Engineering, “minimum sparking potential for various gases” (air second-hand, the others from memory, H).
 *  KZK: Kuffel, Zaengl and Kuffel, High Voltage Engineering Fundamentals, 2nd ed., 2000, ch. 5 (from memory, M). vE: von Engel, Ionized Gases, 2nd ed., 1965 (from memory, M), cathode named.
 *  Škoro et al., Phys. Rev. E 84, 055401, 2011 (read). None was found for krypton and xenon. */
export interface PublishedMinimum {
  readonly voltage: number;
  readonly pd: number;
  readonly source: string;
}

export const publishedMinima: Readonly<Record<string, readonly PublishedMinimum[]>> = {
  argon: [
    { voltage: 137, pd: 0.9, source: 'NK' },
    { voltage: 265, pd: 1.5, source: 'vE, iron' },
  ],
  nitrogen: [
    { voltage: 251, pd: 0.67, source: 'NK' },
    { voltage: 240, pd: 0.65, source: 'KZK' },
    { voltage: 275, pd: 0.75, source: 'vE, iron' },
  ],
  air: [
    { voltage: 327, pd: 0.567, source: 'NK' },
    { voltage: 352, pd: 0.55, source: 'KZK' },
    { voltage: 330, pd: 0.57, source: 'vE, iron' },
  ],
  helium: [
    { voltage: 156, pd: 4, source: 'NK' },
    { voltage: 155, pd: 4, source: 'KZK' },
    { voltage: 150, pd: 2.5, source: 'vE, iron' },
  ],
  neon: [
    { voltage: 245, pd: 4, source: 'KZK' },
    { voltage: 244, pd: 3, source: 'vE, iron' },
  ],
  hydrogen: [
    { voltage: 273, pd: 1.15, source: 'NK' },
    { voltage: 230, pd: 1.05, source: 'KZK' },
    { voltage: 295, pd: 1.25, source: 'vE, platinum' },
  ],
  oxygen: [{ voltage: 450, pd: 0.7, source: 'NK, KZK; vE, iron' }],
  'carbon dioxide': [
    { voltage: 420, pd: 0.51, source: 'NK' },
    { voltage: 420, pd: 0.57, source: 'KZK, vE' },
  ],
  'water vapour': [{ voltage: 480, pd: 0.6, source: 'Škoro et al.' }],
  'sulphur hexafluoride': [{ voltage: 507, pd: 0.26, source: 'KZK' }],
};
