import type { Role } from '#shared/compute/terms/people'

/** Password of all demo accounts; a demo is on the presenter's own machine. */
export const DEMO_PASSWORD = 'smooth motors turn round'

export interface DemoPerson { name: string; email: string; role: Role; supplier?: string; noticeRank?: number }

/** Invented people; addresses under .example reach nobody. */
export const PEOPLE: readonly DemoPerson[] = [
  { name: 'Ines Falkenrath', email: 'ines@kestrelfold.example', role: 'inspector' },
  { name: 'Tobin Ashgrove', email: 'tobin@kestrelfold.example', role: 'inspector' },
  { name: 'Mara Quillfeather', email: 'mara@kestrelfold.example', role: 'engineer' },
  { name: 'Jonas Ferrant', email: 'jonas@kestrelfold.example', role: 'engineer' },
  { name: 'Ottilie Brandrup', email: 'ottilie@kestrelfold.example', role: 'auditor' },
  { name: 'Sander Wick', email: 'sander@kestrelfold.example', role: 'administrator' },
  { name: 'Linnea Torvald', email: 'linnea@kestrelfold.example', role: 'build-engineer' },
  { name: 'Pell Ottomar', email: 'quality@tuvalo.example', role: 'supplier', supplier: 'TUVALO', noticeRank: 1 },
  { name: 'Runa Estby', email: 'runa@tuvalo.example', role: 'supplier', supplier: 'TUVALO', noticeRank: 2 },
  { name: 'Corwin Hale', email: 'quality@ambrel.example', role: 'supplier', supplier: 'AMBREL', noticeRank: 1 },
  { name: 'Dita Marlowe', email: 'dita@ambrel.example', role: 'supplier', supplier: 'AMBREL', noticeRank: 2 },
  { name: 'Signe Holt', email: 'quality@norrhaven.example', role: 'supplier', supplier: 'NORRHAVEN', noticeRank: 1 },
  { name: 'Bram Oskarsen', email: 'bram@norrhaven.example', role: 'supplier', supplier: 'NORRHAVEN', noticeRank: 2 },
  { name: 'Wyn Saltash', email: 'quality@saltmarsh.example', role: 'supplier', supplier: 'SALTMARSH', noticeRank: 1 },
  { name: 'Esra Fenn', email: 'esra@saltmarsh.example', role: 'supplier', supplier: 'SALTMARSH', noticeRank: 2 },
]

export const SUPPLIERS = [
  { code: 'AMBREL', name: 'Ambrel Coilworks', address: '4 Spindle Row, Ambrel', language: 'en' },
  { code: 'TUVALO', name: 'Tuvalo Precision Drives', address: '18 Harbour Lane, Tuvalo', language: 'en' },
  { code: 'NORRHAVEN', name: 'Norrhaven Stepper Co.', address: '7 North Quay, Norrhaven', language: 'en' },
  { code: 'SALTMARSH', name: 'Saltmarsh Rotary', address: '52 Tideway, Saltmarsh', language: 'en' },
] as const
