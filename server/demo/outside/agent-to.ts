import https from 'node:https';
import tls from 'node:tls';

/**
 * Connections over TLS that end at a port of this machine, whatever address they were meant for: no name is looked up,
 * and nothing leaves the machine.
 * @param issuer the only certificate authority that is believed, PEM
 */
export function agentTo(port: number, issuer: string): https.Agent {
  const agent = new https.Agent();
  agent.createConnection = () =>
    // The service has the name of this machine, not of the one that was asked for.
    tls.connect({ host: '127.0.0.1', port, servername: 'localhost', ca: issuer });
  return agent;
}
