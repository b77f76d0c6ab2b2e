export const help = {
  title: 'Help',
  intro:
    'How Millpond is used, how it computes, and what it is not. Every figure on the pages names its own formula and source.',
  marks: 'Marks and drawings',
  marksText: 'Every mark and drawing with its meaning.',
  caution: 'Cautions',
  cautions: [
    'Millpond plans and keeps evidence. It is no safety system and no alarm: it reads no live values, and mail may come late.',
    'Lithium-ion cells can vent, burn or explode when damaged, overcharged, overheated or short-circuited. The cell maker’s limits, the site’s safety rules, local codes and trained or licensed persons stand above everything said here.',
    'Hot and cold chambers: burns, cold burns, condensation on cells unloaded cold, and heavier or lighter atmospheres. Let the chamber come back to its idle temperature before the door opens.',
    'Check the polarity and set the source to the cell’s own open-circuit voltage before you connect it. A mismatch drives current through the cell.',
    'A damaged, swollen or hot cell is not a booking question. Follow the site’s emergency rule, then tell the safety officer.',
  ],
  jobs: 'How to …',
  guides: [
    {
      title: 'Ask for a slot',
      steps: [
        'Requests, then New request. Choose the cell type and number, or registered cells.',
        'Give the state of charge, the set temperature with its tolerance, and settled value or screening. The estimate beside the form follows as you type.',
        'Save the draft as often as you like. Submit it, or propose one of the slots offered: that submits it too.',
        'A proposal reserves nothing. The scheduler books; you see it on the request.',
      ],
    },
    {
      title: 'Book a request',
      steps: [
        'Open the request. The three earliest valid slots stand there with path, load, phases and waiting time.',
        'An earlier slot that a single rule blocks is named with the way out.',
        'Book one, or choose chamber and start by form. Every check runs again when you confirm; if somebody was quicker you see who.',
      ],
    },
    {
      title: 'Record a calibration',
      steps: [
        'Metrology, then Record. Tick what the certificate covers, channel by channel and range by range.',
        'Attach the certificate and send it for approval.',
        'A second person approves. From that moment badges, board and checks follow.',
      ],
    },
    {
      title: 'When something breaks',
      steps: [
        'Open the instrument and report the breakdown. Nothing new can be booked over it.',
        'Bookings over it become at risk at once and are listed. Move or cancel them.',
        'A metrologist returns it to service; what was at risk only for this is cleared.',
      ],
    },
  ],
  science: 'How it computes',
  formulas: [
    {
      title: 'Length of the hold',
      text: 'The hold lasts until the sum of what the voltage mismatch and the residual thermal lag still add to the current stays inside the tolerance. The electrical part decays with the cell’s own time constant, the thermal part with the cell’s.',
      formula: 'τ = (R_ext + R_s) · C,   I_mismatch(t) = ΔV₀/R · e^(−t/τ)',
      source:
        'First-order circuit of a cell held at constant voltage; its capacitance is the slope of charge over open-circuit voltage.',
    },
    {
      title: 'False current from temperature',
      text: 'A cell whose temperature moves changes its open-circuit voltage. Holding the voltage then drives a current that looks like leakage.',
      formula: 'I = C · α · dT/dt',
      source:
        'α = dU/dT is the entropic coefficient; C the capacitance at the state of charge. A log with a resolution too coarse to tell says so.',
    },
    {
      title: 'False current from the source',
      text: 'A source that drifts charges the cell slowly.',
      formula: 'I = C · dV/dt',
      source: 'From the source’s record, in µV per hour.',
    },
    {
      title: 'Expected current and temperature',
      text: 'Where no measured figure exists the expected current comes from the capacity and is scaled with temperature.',
      formula: 'I(T) = I(25 °C) · exp(E_a/R · (1/298.15 K − 1/T)),   E_a = 60 kJ/mol',
      source:
        'Arrhenius law; the figure is a common-practice default, said so wherever it is used.',
    },
    {
      title: 'Safe length',
      text: 'Likely is the middle; safe is enough with the probability the site has chosen. The margin between them is held free until the run proves it is not needed, and narrows as runs come in.',
      formula: 'safe hold = likely hold · exp(m + t · s)',
      source:
        'Learned from the ratio of measured to likely holds; a cautious prior until there are runs.',
    },
  ],
  words: 'Words',
  glossary: [
    ['hold', 'the measuring hold at the cell’s own voltage, and nothing else'],
    ['load', 'what is in a chamber between two door openings'],
    ['path', 'source channel, meter channel and chamber position for one cell'],
    ['panel', 'channels and positions that can be connected with each other'],
    ['still phase', 'soak, match, hold or measure: nothing may disturb the chamber'],
    ['likely, safe', 'typical length; the length that is enough with the chosen probability'],
    ['allowance', 'the current that disturbances may cause in all'],
    ['at risk', 'a confirmed booking that no longer passes a rule'],
    ['deviation', 'a rule lifted beforehand by another person, with reason and end'],
    ['indicative', 'work in which quality rules are cautions; every output is marked'],
    ['due', 'a day at the site; valid to its end, 24:00'],
  ],
  wordHead: 'Word',
  meaningHead: 'Meaning',
  keys: 'Keys',
  keyList: [
    ['/', 'find a tag, cell, booking or request'],
    ['Tab', 'next control; everything can be reached with it'],
    ['Esc', 'closes what asks, and keeps everything as it was'],
  ],
  keyHead: 'Key',
  doesHead: 'Does',
  licence:
    'Millpond is free software under the GNU General Public License, version 3 or later. It comes without any warranty.',
} as const;
