/**
 * The two limits the pipeline is compared with, in a process of their own. `broker`: acknowledges at once, stores
 * nothing. `durable`: acknowledges after a grouped commit of one narrow row per message, without any checking,
 * sorting or telling.
 */
import { createServer, type AddressInfo } from 'node:net';
import { Aedes } from 'aedes';
import pg from 'pg';

const kind = process.argv[2];
const broker = await Aedes.createBroker({ concurrency: 1000 });

if (kind === 'durable') {
  const pool = new pg.Pool({ connectionString: process.argv[3], max: 1 });
  await pool.query('drop table if exists bare_readings');
  await pool.query(`create table bare_readings (
    device text not null, boot text not null, n bigint not null, at timestamptz not null, conductivity_us_cm float8,
    temperature_c float8, primary key (device, boot, n))`);
  const waiting: { text: string; done: () => void }[] = [];
  let isBusy = false;
  const commit = async (): Promise<void> => {
    while (waiting.length > 0) {
      const group = waiting.splice(0, 2000);
      const messages = group.map(({ text }) => JSON.parse(text) as Message);
      await pool.query(insert, [
        messages.map((message) => message.device),
        messages.map((message) => message.boot),
        messages.map((message) => message.readings[0]!.n),
        messages.map((message) => message.readings[0]!.at),
        messages.map((message) => message.readings[0]!.conductivity_us_cm),
        messages.map((message) => message.readings[0]!.temperature_c),
      ]);
      for (const { done } of group) done();
    }
    isBusy = false;
  };
  broker.authorizePublish = (client, packet, callback) => {
    const text = `{"device":"${client?.id ?? ''}",${packet.payload.toString().slice(1)}`;
    waiting.push({ text, done: () => callback(null) });
    if (isBusy) return;
    isBusy = true;
    setImmediate(() => void commit());
  };
}

interface Message {
  device: string;
  boot: string;
  readings: { n: number; at: string; conductivity_us_cm: number; temperature_c: number }[];
}

const insert = `
  insert into bare_readings select * from unnest($1::text[], $2::text[], $3::bigint[], $4::timestamptz[], $5::float8[], $6::float8[])
  on conflict do nothing`;

const server = createServer({ noDelay: true }, broker.handle);
server.listen(0, '127.0.0.1', () => process.send?.({ port: (server.address() as AddressInfo).port }));
process.on('disconnect', () => process.exit(0));
