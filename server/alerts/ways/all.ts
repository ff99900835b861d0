/** All ways out of the house, made from the settings of the installation. */
import https from 'node:https';
import { Agent, type Dispatcher } from 'undici';
import type { Config } from '../../config';
import { loadPushKeys, pushSubject } from '../vapid';
import { makeBrowserPush, type BrowserPush } from './browser-push';
import { makeEMail, type EMail } from './e-mail';
import { makePhonePush, type PhonePush } from './phone-push';
import { publicOnlyAgent } from './public-address';

export interface Ways {
  /** The public one of the keys. */
  pushKey: string;
  browserPush: BrowserPush;
  phonePush: PhonePush;
  /** Null: this server cannot send letters. */
  eMail: EMail | null;
  close(): void;
}

const TIMEOUT_MS = 15_000;

/** @param fakes connections to services that stand in for the real ones, in tests */
export function makeWays(config: Config, fakes: { push?: https.Agent; phones?: Dispatcher } = {}): Ways {
  const keys = {
    ...loadPushKeys(config.dataDir),
    subject: pushSubject(config.publicUrl, config.mail?.from ?? null),
  };
  const agent = fakes.push ?? (config.localPush ? new https.Agent({ keepAlive: true }) : publicOnlyAgent());
  const phones =
    fakes.phones ??
    new Agent({ connect: { timeout: TIMEOUT_MS }, headersTimeout: TIMEOUT_MS, bodyTimeout: TIMEOUT_MS });
  const eMail = config.mail === null ? null : makeEMail(config.mail, config.publicUrl);
  return {
    pushKey: keys.publicKey,
    browserPush: makeBrowserPush(keys, agent),
    phonePush: makePhonePush(phones, config.expoToken),
    eMail,
    close() {
      agent.destroy();
      void phones.destroy();
      eMail?.close();
    },
  };
}
