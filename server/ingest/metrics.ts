/** What only ingest counts; the rest stands in server/http/metrics.ts. */
import { Counter, Gauge } from 'prom-client';
import { metrics } from '../http/metrics.ts';

export const connectionsRefused = new Counter({
  name: 'saltmark_device_connections_refused_total',
  help: 'Connections of devices refused, by reason.',
  labelNames: ['reason'] as const,
  registers: [metrics],
});
export const messagesWaiting = new Gauge({
  name: 'saltmark_ingest_waiting_messages',
  help: 'Messages held unacknowledged until the database has them.',
  registers: [metrics],
});
