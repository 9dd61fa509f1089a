/** IPv4 loopback is the whole of 127.0.0.0/8 (RFC 1122, 3.2.1.3). */
const LOOPBACK_V4 = /^127\.\d{1,3}\.\d{1,3}\.\d{1,3}$/;

/** `host` or `host:port`, an IPv6 address in brackets (RFC 9110, 7.2). */
const HOST_HEADER = /^(?:\[(?<v6>[0-9a-f:.]+)\]|(?<name>[^:@/\s]+))(?::\d*)?$/i;

/** Whether only programs of this machine can reach a server that listens on the host. */
export function isLoopback(host: string): boolean {
  return host === 'localhost' || host === '::1' || LOOPBACK_V4.test(host);
}

/**
 * Whether a request was meant for this server. A foreign page can give its own name this machine's address (DNS
 * rebinding) and would then be allowed to read what we answer; its name stays in the Host header, so it shows.
 *
 * @param header the Host header; undefined when there is none
 * @param listening host the server was told to listen on
 */
export function isMeantForHost(header: string | undefined, listening: string): boolean {
  const parts = HOST_HEADER.exec(header ?? '')?.groups;
  const asked = (parts?.['v6'] ?? parts?.['name'])?.toLowerCase();
  return asked !== undefined && [listening.toLowerCase(), 'localhost', '127.0.0.1'].includes(asked);
}
