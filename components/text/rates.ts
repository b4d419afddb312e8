export const ratesText = {
  title: 'What this plant pays',
  words:
    'Estimates of corner plans say money with these rates, beside hours, oxygen and energy. What is left empty is left out.',
  fetching: 'Fetching the rates',
  none: 'No rates given: estimates say hours, oxygen and energy, and no money.',
  change: 'Change the rates',
  give: 'Give rates',
  save: 'Save the rates',
  cancel: 'Leave them as they are',
  changedBy: (who: string, when: string) => `${who}, ${when}`,
  fields: {
    currency: 'Currency',
    currencyHint: 'As it shall stand behind an amount, as in EUR.',
    machineHour: 'An hour of the machine',
    machineHourHint: 'With whoever stands at it, without oxygen and electricity.',
    oxygenKilogram: 'A kilogram of oxygen',
    oxygenKilogramHint: 'A cubic metre at 0 °C and 1.013 bar weighs 1.43 kg.',
    electricityKilowattHour: 'A kilowatt hour of electricity',
    wallPlugEfficiency: 'Light out of the laser over electricity into it',
    wallPlugEfficiencyHint: 'About a third for a fibre laser, common practice; less with its cooler.',
  },
  notGiven: 'not given',
} as const;
