import type { Config } from '../../config.ts';

/** Where a device connects: the outside broker without its own credentials, else this server by its public name. */
export function brokerUrlOf(config: Config): string {
  if (config.outsideBrokerUrl) {
    const url = new URL(config.outsideBrokerUrl);
    url.username = '';
    url.password = '';
    return url.href;
  }
  const host = new URL(config.publicUrl).hostname;
  return config.mqttTls ? `mqtts://${host}:${config.mqttTlsPort}` : `mqtt://${host}:${config.mqttPort}`;
}
