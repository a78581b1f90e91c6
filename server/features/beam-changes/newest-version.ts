/** SQL: no version of its protocol was saved after the version `v`. */
export const isNewestVersion = `not exists
  (select 1 from versions w where w.lab_id = v.lab_id and w.protocol_id = v.protocol_id and w.number > v.number)`;
