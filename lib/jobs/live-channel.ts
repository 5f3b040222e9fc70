/** The pub/sub channel of one session's live events. The lab is part of the name, so that no event crosses labs. */
export function liveChannel(labId: string, sessionId: string): string {
  return `outfold:live:${labId}:${sessionId}`;
}
