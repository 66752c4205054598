/** The policy: every tolerance and default that is a matter of judgement, in one schema with its defaults. */
import { z } from 'zod';

const positive = z.number().positive();

export const policySchema = z
  .strictObject({
    /** Pressure of the published diagram [Pa]. */
    pressurePa: positive.default(100000),
    /** Significance per substance: faults and doubts. */
    alphaFault: z.number().gt(0).lt(1).default(0.001),
    alphaDoubt: z.number().gt(0).lt(1).default(0.01),
    material: z
      .strictObject({
        transitionTemperatureK: positive.default(0.5),
        entropyRelative: positive.default(0.001),
        entropyJPerMolK: positive.default(0.05),
        enthalpyJPerMol: positive.default(50),
        heatCapacityRelative: positive.default(0.01),
      })
      .prefault({}),
    cell: z
      .strictObject({
        /** A cell is named above this normalised residual. */
        threshold: positive.default(6),
        /** ... and when the change is at least this many units of the last place. */
        lastPlaces: positive.default(5),
      })
      .prefault({}),
    /** Standard uncertainties taken where a measured source states none. */
    defaultUncertainty: z
      .strictObject({
        heatCapacityRelative: positive.default(0.01),
        entropyRelative: positive.default(0.005),
        enthalpyIncrementRelative: positive.default(0.005),
        enthalpyOfFormationJPerMol: positive.default(1000),
        transitionTemperatureRelative: positive.default(0.0005),
        transitionEnthalpyRelative: positive.default(0.02),
        transitionEntropyRelative: positive.default(0.02),
        pressureRelative: positive.default(0.01),
      })
      .prefault({}),
    grid: z
      .strictObject({
        /** Published temperatures besides the raw ones: multiples of this [K]. */
        stepK: positive.default(100),
      })
      .prefault({}),
    continuation: z
      .strictObject({
        /** 'hold': the last Cp is held; 'none': a phase ends where its data end. */
        method: z.enum(['hold', 'none']).default('hold'),
        /** How far beyond the data a phase is continued, as a share of the last temperature. */
        reachRelative: positive.default(0.1),
        /** Growth of u(Cp) with distance: this share of Cp per 100 K. */
        relativePer100K: positive.default(0.1),
      })
      .prefault({}),
    lossGuard: z
      .strictObject({
        share: z.number().min(0).max(1).default(0.01),
        atLeast: z.number().int().min(1).default(3),
      })
      .prefault({}),
    /** Keep the last cleared values of substances now withheld in `held_over`. */
    heldOver: z.boolean().default(false),
    preferredSources: z.array(z.string()).default([]),
  })
  .prefault({});

export type Policy = z.infer<typeof policySchema>;
