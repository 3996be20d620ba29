/** A commented case to start from; it validates as it stands. */
export function caseTemplate(): string {
  return TEMPLATE;
}

const TEMPLATE = `# Every quantity carries its unit: 6 mm, 1.2 Torr, 100 kohm, 12 1/(cm Torr). Units are case-sensitive; a/(b c) needs its parentheses.
# Lines that start with "# " show optional entries; what they default to stands beside them.

title: Bias feedthrough during an argon backfill

gap:
  geometry: planar
  spacing: 4 mm                 # between the electrodes
  area: 3 cm^2                  # that faces the other electrode
  longest_path: 25 mm           # the longest way around that a discharge could take; default: the spacing

gas:
  name: argon                   # built-in data; \`gapwake gas\` lists them
  # data: phelps-petrovic       # which set of it, where sources disagree; \`check\` says what the others give
  # mixture: { argon: 0.9, nitrogen: 0.1 }      # instead of name: fractions that sum to 1
  pressure: 2 mbar
  temperature: 20 °C            # default 293.15 K
  # coefficients:               # your own, alone or in place of single built-in ones
  #   ionisation: { form: exponential, A: 12 1/(cm Torr), B: 180 V/(cm Torr), valid_from: 100 V/(cm Torr), valid_to: 600 V/(cm Torr) }
  #   electron_mobility: 3.3e5 cm^2 Torr/(V s)
  #   ion_mobility: { K0: 1.5 cm^2/(V s) }      # reduced mobility; or mobility times pressure or density
  #   reference_temperature: 293.15 K           # at which data against pressure hold

electrodes:                     # left is at x = 0, right at x = spacing
  left: { ion_yield: 0.02 }     # electrons per arriving ion; or { material: NAME } for a built-in yield
  # left: { ion_yield: { low: 0.005, typical: 0.02, high: 0.08 } }    # with its spread
  # left: { ion_yield: { table: { file: yield.csv, reduced_field: EN, yield: gamma }, low: 0.5, high: 2 } }   # against E/N at the cathode; low, high: factors
  # left: { material: nickel, surface: technical }    # in argon, by the energy of its ions; or clean, also in other gases
  # right: { ion_yield: 0.02 }  # default: same as left

seed:
  cathode_current: 1 pA         # leaves whichever electrode is the cathode
  # electrons: 1                # released at the cathode at t = 0; default 0

supply:
  voltage: { step: 350 V, rise_time: 10 us }    # positive: the left electrode is the cathode; rise_time: default 0 s
  # voltage: { ramp: { from: 0 V, to: 500 V, rate: 50 V/s } }
  # voltage: { table: { file: bias.csv, time: t, voltage: bias } }
  series_resistance: 220 kohm   # 0 ohm is allowed
  parallel_capacitance: 15 pF   # default 0 F
  # current_limit: 2 mA         # default none
  # trip: { current: 1 mA, delay: 50 us, senses: gap, action: open }   # default none; senses: gap or supply; action: open or zero
  # initial_gap_voltage: 0 V    # what the gap holds at t = 0

electrons: { closure: local-field }   # or { closure: kinetic, emission_energy: 2 eV, particles: 20000, seed: 1 }: as particles

observe:
  until: 20 ms                  # ends earlier when steady or died out
  currents: [10 nA, 1 uA, 100 uA]   # report when the conduction current first crosses each

# numerics: { cells: 150, tolerance: 1e-3 }     # cells: default the program's choice

# scan:                         # many gaps at once: \`gapwake scan\`
#   vary:                       # any quantity or plain number of the case; several make a grid, or walk together with zip: true
#     - { path: gas.pressure, from: 0.2 mbar, to: 20 mbar, points: 25, spacing: log }   # spacing: default linear
#     - { path: supply.voltage.step, values: [300 V, 350 V, 400 V] }
#   find: { what: hold-off, from: 150 V, to: 900 V }    # at each point; tolerance: default 0.1 %
#   # find: { what: trip-delay, gap_energy: 1 mJ, from: 1 us, to: 1 s }
#   # find: { what: series-resistance, from: 100 ohm, to: 100 Mohm }

# history:                      # the pressure around the gap in time: \`gapwake window\`
#   duration: 3 h               # default: that of the tables, if every entry is a table
#   pressure:                   # one of bay, ascent, table, dataset
#     bay:
#       volume: 12 L
#       start: 1013 hPa
#       outside: { ascent: { from: 0 km, to: 35 km, rate: 5 m/s } }     # or { pressure: 0 Pa }, or { table: … }
#       vents: [ { diameter: 5 mm, length: 2 mm, count: 4, discharge_coefficient: 0.7 } ]
#       # pump: { speed: 50 L/s, base_pressure: 1e-6 mbar }
#       # gas_load: 1e-4 mbar L/s
#       # outgassing: [ { area: 0.4 m^2, rate_at_1h: 1e-8 Torr L/(s cm^2), exponent: 1.0 } ]
#     # ascent: { from: 0 km, to: 35 km, rate: 5 m/s }
#     # table: { file: bay.csv, time: t, pressure: p }
#     # dataset: { file: log.h5, dataset: /bay/pressure, time: /bay/time }    # unit: and time_unit: where the file gives none
#   temperature: 295 K          # or { table: … }; default gas.temperature
#   voltage: 350 V              # while energised, or { table: … }; default the largest of supply.voltage
#   margin: 1.5                 # a hold counts as marginal if this factor on the voltage breaks it down
`;
