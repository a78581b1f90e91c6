/** Where a run of this version is prepared. */
export function startHref(
  labId: string,
  version: { readonly protocolId: string; readonly number: number },
): string {
  return `/labs/${labId}/bench/start?protocolId=${version.protocolId}&number=${version.number}`;
}
