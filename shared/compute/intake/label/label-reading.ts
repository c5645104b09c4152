export type LabelKind = 'iso15434' | 'gs1' | 'plain'

/** An identifier with its value, as on the label: a GS1 application identifier or an MH10.8.2 data identifier. */
export interface LabelElement {
  identifier: string
  value: string
}

/** A reason for which a label cannot be used as it is. */
export interface LabelFault {
  code: LabelFaultCode
  /** What is wrong, one sentence. */
  sentence: string
  /** What to do, one sentence. */
  remedy: string
}

export type LabelFaultCode =
  | 'label.empty' | 'label.too-long' | 'label.envelope' | 'label.format' | 'label.separators-missing' | 'label.unfinished'
  | 'label.empty-value' | 'label.value-too-long' | 'label.value-format' | 'label.quantity' | 'label.repeated'
  | 'label.check-digit' | 'label.date' | 'label.identifier'

/** Something odd on the label that does not stop its use. */
export interface LabelRemark {
  code: 'label.record-separator-missing' | 'label.trailer-missing' | 'label.separator-substituted' | 'label.pair-required' | 'label.identifier-unknown' | 'label.field-empty'
  sentence: string
}

/** What a label says, as far as receiving needs it; only what stands on the label is present. */
export interface LabelContent {
  /** The buyer's part number (P, 241). */
  part?: string
  /** The supplier's part number (1P, 240). */
  supplierPart?: string
  /** Revision of the part (2P). */
  revision?: string
  /** Pieces, whole, ≥ 1 (Q, 7Q in pieces, 30, 37). */
  quantity?: number
  /** Lot number (1T, otherwise T; 10). */
  lot?: string
  /** Serial number (S, 21). */
  serial?: string
  /** Supplier's code (V, 1V, 12V). */
  supplier?: string
  /** The buyer's order (K, 14K, 400). */
  orderNumber?: string
  /** GTIN (01, 02), 14 digits. */
  gtin?: string
  /** Package or logistic unit (3S, 1J, 00). */
  packageNumber?: string
}

export interface LabelRead extends LabelContent {
  ok: true
  kind: LabelKind
  /** The text scanned, without line ends; a plain code may simply be a serial, so look this up first. */
  text: string
  /** Every element in label order. */
  elements: LabelElement[]
  /** Elements whose identifier says nothing to receiving. */
  unknown: LabelElement[]
  remarks: LabelRemark[]
}

/** Nothing of an unusable label is lost: text and elements read so far stay. */
export interface LabelRefused {
  ok: false
  kind: LabelKind
  text: string
  elements: LabelElement[]
  faults: LabelFault[]
}

/** What a scan gives. */
export type LabelReading = LabelRead | LabelRefused

/** Elements, faults and remarks of one grammar. */
export interface GrammarResult {
  elements: LabelElement[]
  faults: LabelFault[]
  remarks: LabelRemark[]
}
