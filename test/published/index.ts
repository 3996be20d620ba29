/** Every published source that the program is checked against, one file each. `npm run checks` prints them; checks.test.ts and checks.long.test.ts hold them. */
import { badaloniGallimberti1972 } from './badaloni-gallimberti-1972.ts';
import { boydCrichton1971 } from './boyd-crichton-1971.ts';
import type { Source } from './check.ts';
import { criticalFields } from './critical-fields.ts';
import { davidsonRaether } from './davidson-raether.ts';
import { dweydariMee1975 } from './dweydari-mee-1975.ts';
import { ellis1976 } from './ellis-1976.ts';
import { fisherBederson1951 } from './fisher-bederson-1951.ts';
import { hagstrum1954 } from './hagstrum-1954.ts';
import { hornbeck1951 } from './hornbeck-1951.ts';
import { iec60664 } from './iec-60664-1.ts';
import { kuffelZaenglKuffel } from './kuffel-zaengl-kuffel.ts';
import { lieberman2005 } from './lieberman-2005.ts';
import { lucasSaelee1975 } from './lucas-saelee-1975.ts';
import { michaelson1977 } from './michaelson-1977.ts';
import { naiduKamaraju } from './naidu-kamaraju.ts';
import { normalGlow } from './normal-glow.ts';
import { oskamMittelstadt1963 } from './oskam-mittelstadt-1963.ts';
import { raizer1991 } from './raizer-1991.ts';
import { raju } from './raju.ts';
import { reid1979 } from './reid-1979.ts';
import { schade1937 } from './schade-1937.ts';
import { skoro2011 } from './skoro-2011.ts';
import { townsendCurrents } from './townsend-currents.ts';
import { uniformFieldAir } from './uniform-field-air.ts';
import { usStandardAtmosphere1976 } from './us-standard-atmosphere-1976.ts';
import { vacuumHandbooks } from './vacuum-handbooks.ts';
import { vonEngel1965 } from './von-engel-1965.ts';
import { ward1962 } from './ward-1962.ts';

export const sources: readonly Source[] = [
  naiduKamaraju,
  kuffelZaenglKuffel,
  vonEngel1965,
  skoro2011,
  uniformFieldAir,
  raju,
  townsendCurrents,
  davidsonRaether,
  schade1937,
  fisherBederson1951,
  ellis1976,
  hornbeck1951,
  oskamMittelstadt1963,
  ward1962,
  raizer1991,
  lieberman2005,
  badaloniGallimberti1972,
  boydCrichton1971,
  criticalFields,
  reid1979,
  lucasSaelee1975,
  normalGlow,
  hagstrum1954,
  michaelson1977,
  dweydariMee1975,
  iec60664,
  usStandardAtmosphere1976,
  vacuumHandbooks,
];
