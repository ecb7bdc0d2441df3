/** How the limit is known. Anything less certain is left out of the list. */
export type Certainty =
  /** Clause or table text was read in a public copy. */
  | 'read'
  /** The sentence was read as quoted in public material. */
  | 'read-quotation'
  /** The value was read in public material that cites the standard. */
  | 'read-secondary'
  /** Recalled, consistent in several places, not read. */
  | 'memory-high';

/** Half-width of the symmetric allowance for one end, in ppm of the carrier or in Hz. */
export type AirInterfaceTolerance = ({ readonly ppm: number } | { readonly hz: number }) & {
  readonly relativeTo: 'absolute' | 'received-carrier';
  readonly note?: string;
};

/** A published radio interface from which the description of a receiver can start. */
export interface AirInterface {
  readonly id: string;
  readonly name: string;
  readonly role: string;
  readonly carrierBandsHz: readonly (readonly [number, number])[];
  readonly referenceCarrierHz: number;
  /** null where the standard sets none. */
  readonly tolerance: AirInterfaceTolerance | null;
  readonly symbolRateHz?: number;
  readonly chipRateHz?: number;
  readonly subcarrierSpacingHz?: number;
  readonly channelBandwidthHz?: number;
  readonly channelSpacingHz?: number;
  readonly modulation?: string;
  readonly pulse?: {
    readonly shape: 'root-raised-cosine' | 'raised-cosine' | 'half-sine' | 'gaussian';
    readonly rollOff?: number;
    readonly bandwidthTime?: number;
  };
  readonly source: { readonly standard: string; readonly clause?: string };
  readonly certainty: Certainty;
  readonly howKnown: string;
  readonly notes?: string;
}
