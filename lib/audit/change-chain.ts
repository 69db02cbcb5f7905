/** The part of a change's event that its hash covers. */
export function eventContent(row: {
  changeId: string;
  seq: number;
  action: string;
  byId: string;
  byName: string;
  byRole: string;
  at: Date;
  meaning: string | null;
  remark: string;
  payload: Record<string, unknown>;
  contentHash: string;
}) {
  const { changeId, seq, action, byId, byName, byRole, meaning, remark, payload, contentHash } = row;
  return {
    changeId,
    seq,
    action,
    byId,
    byName,
    byRole,
    at: row.at.toISOString(),
    meaning,
    remark,
    payload,
    contentHash,
  };
}
