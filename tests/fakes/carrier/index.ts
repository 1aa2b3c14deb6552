import { portFromEnvironment, runFakeProcess } from '../kit/serve.ts';
import { startCarrierFake } from './start-carrier-fake.ts';

/** `manual` leaves every parcel to the buttons. */
function deliverySeconds(): number | null {
  const text = process.env.FAKE_DELIVERY_SECONDS || '120';
  if (text === 'manual') return null;
  if (!/^\d{1,8}$/.test(text)) throw new Error('FAKE_DELIVERY_SECONDS must be whole seconds or "manual"');
  return parseInt(text, 10);
}

await runFakeProcess('Carrier', () =>
  startCarrierFake({
    port: portFromEnvironment('FAKE_PORT', 4105),
    dataDir: process.env.FAKE_DATA_DIR,
    apiKey: process.env.FAKE_API_KEY,
    deliverySeconds: deliverySeconds(),
  }),
);
