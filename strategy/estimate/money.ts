/** What a plant pays, in its own currency; what it does not say is null. */
export type Rates = {
  /** As the plant writes it: "EUR", "£". */
  readonly currency: string;
  /** For an hour of the machine, with whoever stands at it. */
  readonly machineHour: number | null;
  readonly oxygenKilogram: number | null;
  readonly electricityKilowattHour: number | null;
  /** Light out of the laser over electrical energy into it, 0..1. */
  readonly wallPlugEfficiency: number;
};

/** Amounts in the plant's currency; null where it gives no rate. */
export type Money =
  | {
      readonly kind: 'ok';
      readonly currency: string;
      readonly machine: number | null;
      readonly oxygen: number | null;
      readonly electricity: number | null;
      /** Of what is known. */
      readonly total: number;
    }
  | { readonly kind: 'none'; readonly why: string };

export type Spent = { readonly time: number; readonly oxygen: number; readonly laser: number }; // s, kg, J

const joulesPerKilowattHour = 3.6e6;

/** What time, oxygen and laser energy cost at a plant's rates, in its currency; none, with the reason, when it gives none. RangeError for an efficiency outside (0, 1]. */
export function moneyOf({ time, oxygen, laser }: Spent, rates: Rates | null): Money {
  if (
    rates === null ||
    (rates.machineHour === null && rates.oxygenKilogram === null && rates.electricityKilowattHour === null)
  ) {
    return { kind: 'none', why: 'The plant gives no rates.' };
  }
  const { currency, machineHour, oxygenKilogram, electricityKilowattHour, wallPlugEfficiency } = rates;
  if (!(wallPlugEfficiency > 0 && wallPlugEfficiency <= 1)) {
    throw new RangeError(`wall-plug efficiency ${wallPlugEfficiency} is outside (0, 1]`);
  }
  const machine = machineHour === null ? null : (machineHour * time) / 3600;
  const gas = oxygenKilogram === null ? null : oxygenKilogram * oxygen;
  const drawn = laser / wallPlugEfficiency / joulesPerKilowattHour;
  const electricity = electricityKilowattHour === null ? null : electricityKilowattHour * drawn;
  return {
    kind: 'ok',
    currency,
    machine,
    oxygen: gas,
    electricity,
    total: (machine ?? 0) + (gas ?? 0) + (electricity ?? 0),
  };
}
