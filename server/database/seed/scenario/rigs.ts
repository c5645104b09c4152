import type { Method, RigProperties } from '#shared/compute/terms/measurement'

export interface DemoRig {
  code: string
  name: string
  method: Method
  location: string
  properties: RigProperties
  /** Months between calibrations and days before today of the last one. */
  calibrations: { certificateNumber: string; daysAgo: number; months: number }[]
}

const sensor = (rangeNm: number): RigProperties => ({
  rangeNm, torqueResolutionNm: 1e-6 * rangeNm, torqueRelativeUncertainty: 0.001, torqueAbsoluteUncertaintyNm: 1e-5 * rangeNm, angleResolutionRad: 2 * Math.PI / 16384, bandwidthHz: 500,
})

/** Two rigs in use and one whose calibration has lapsed. */
export const RIGS: readonly DemoRig[] = [
  { code: 'TR-1', name: 'Torque rig 1, up to 0.5 N·m', method: 'torque-sensor', location: 'Dock 1', properties: sensor(0.5), calibrations: [{ certificateNumber: 'HC-2025-0731', daysAgo: 520, months: 12 }, { certificateNumber: 'HC-2026-0288', daysAgo: 190, months: 12 }] },
  { code: 'TR-2', name: 'Torque rig 2, up to 0.5 N·m', method: 'torque-sensor', location: 'Dock 2', properties: sensor(0.5), calibrations: [{ certificateNumber: 'HC-2025-0655', daysAgo: 560, months: 12 }, { certificateNumber: 'HC-2026-0311', daysAgo: 230, months: 12 }] },
  { code: 'TR-3', name: 'Torque rig 3, small motors', method: 'torque-sensor', location: 'Dock 2', properties: sensor(0.1), calibrations: [{ certificateNumber: 'HC-2025-0402', daysAgo: 410, months: 12 }] },
]
