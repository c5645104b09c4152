import type { MotorDesign } from '#shared/compute/terms/motor'

/** "12 slots, 14 poles". */
export function designText(design: MotorDesign): string {
  if (design.kind === 'brushless') return `${design.slots} slots, ${design.poles} poles`
  return design.kind === 'hybrid stepper' ? `hybrid stepper, ${design.rotorTeeth} rotor teeth` : `claw-pole stepper, ${design.polePairs} pole pairs`
}

/** Torque in mN·m as typed into forms, without float noise; null stays null. */
export const toMilli = (newtonMetres: number | null): number | null => newtonMetres === null ? null : Number((newtonMetres * 1e3).toPrecision(12))
export const fromMilli = (milli: number | null): number | null => milli === null || !Number.isFinite(milli) ? null : Number((milli / 1e3).toPrecision(12))
