const WORDS: Record<string, string> = {
  'session.started': 'signed in', 'session.ended': 'signed out', 'lot.received': 'lot received', 'lot.accepted': 'lot accepted', 'lot.rejected': 'lot rejected', 'sample.bound': 'serial bound',
  'upload.tray': 'file put in the tray', 'upload.refused': 'file refused', 'upload.incomplete': 'one direction stored', 'upload.assigned': 'file assigned', 'upload.discarded': 'file taken off the list',
  'motor.measured': 'motor measured', 'motor.voided': 'measurement voided', 'paper.issued': 'paper issued', 'paper.drawn': 'PDF stored', 'paper.withdrawn': 'paper withdrawn',
  'rig.added': 'rig added', 'rig.changed': 'rig changed', 'rig.calibrated': 'calibration entered', 'rig.recipe-confirmed': 'columns confirmed', 'part.added': 'part added', 'part.changed': 'part changed',
  'sheet.drafted': 'limits drafted', 'sheet.saved': 'draft saved', 'sheet.submitted': 'limits submitted', 'sheet.sent-back': 'limits sent back', 'sheet.approved': 'limits approved', 'sheet.retired': 'limits retired',
  'person.added': 'account added', 'person.changed': 'account changed', 'person.disabled': 'account disabled', 'person.enabled': 'account enabled', 'person.password-reset': 'password reset', 'drift.base-frozen': 'base period frozen',
  'notice.sent': 'mail sent', 'nonconformance.opened': 'nonconformance opened', 'nonconformance.closed': 'nonconformance closed', 'nonconformance.disposition': 'disposition decided', 'nonconformance.acknowledged': 'notice acknowledged', 'nonconformance.answered': 'answer given',
}

/** An entry's action in plain words. */
export const actionWords = (action: string): string => WORDS[action] ?? action.replaceAll(/[.-]/g, ' ')
