import { Switch } from '@fluentui/react-components';
import { useState } from 'react';
import { deviceWays, isOn, speak, sound, switchWay, type DeviceWay } from './device';

const names: Record<DeviceWay, string> = {
  sound: 'Sound on this device',
  speech: 'Spoken words on this device',
  browser: 'Browser notifications on this device',
};

/** What this device may do by itself: everything off until somebody switches it on here. */
export function DeviceWays() {
  const [on, setOn] = useState(() => new Set(deviceWays.filter(isOn)));
  const [refusal, setRefusal] = useState<string | null>(null);
  const change = async (way: DeviceWay, wanted: boolean) => {
    setRefusal(null);
    if (wanted && way === 'browser' && (await Notification.requestPermission()) !== 'granted') {
      setRefusal('The browser does not allow notifications from this page. Its own settings can.');
      return;
    }
    switchWay(way, wanted);
    setOn((before) => {
      const next = new Set(before);
      if (wanted) next.add(way);
      else next.delete(way);
      return next;
    });
    // Heard at once, so that nobody finds out at the first lost fix that it is too loud, or silent.
    if (wanted && way === 'sound') sound();
    if (wanted && way === 'speech') speak('Spoken notices are on.');
  };
  return (
    <section className="device-ways" aria-label="This device">
      <h2>This device</h2>
      {deviceWays.map((way) => (
        <div key={way}>
          <Switch
            label={names[way]}
            checked={on.has(way)}
            onChange={(_, { checked }) => void change(way, checked)}
          />
        </div>
      ))}
      {refusal && <p role="alert">{refusal}</p>}
    </section>
  );
}
