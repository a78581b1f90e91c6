/** Of a plate of which nobody wrote down more than its optics. */
export const undescribed = {
  serial: '',
  clearApertureMm: null,
  coatingNm: null,
  damageNote: '',
  note: '',
} as const;
