import { getJson, send, sendJson } from '#client/lib/http.ts';
import { type PresenceBeat, type PresenceDto, presenceDto } from '#shared/contract/presence.ts';

/** The calls about who has a net open. None of them is waited for by anybody. */
export interface PresenceApi {
  beat(told: PresenceBeat): Promise<PresenceDto>;
  present(): Promise<PresenceDto>;
  leave(): Promise<void>;
}

export function presenceApi(netId: string, clientId: string): PresenceApi {
  const path = `/nets/${netId}/presence`;
  return {
    beat: (told) => sendJson('PUT', `${path}/${clientId}`, presenceDto, { body: told, unasked: true }),
    present: () => getJson(path, presenceDto, { unasked: true }),
    leave: () => send('DELETE', `${path}/${clientId}`, { unasked: true, keepalive: true }),
  };
}
