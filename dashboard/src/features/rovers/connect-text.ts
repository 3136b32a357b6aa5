/** How a rover reports, ready to be copied into a receiver, a logger or a shell. */
export function connectTexts(origin: string, host: string, key: string) {
  return [
    {
      name: 'HTTP: for loggers that can post a file',
      words:
        'Sentences one a line, live or stored. For stored ones add ?date=YYYY-MM-DD, the UTC date of the first.',
      text: `curl --data-binary @sentences.nmea \\
  -H "Authorization: Bearer ${key}" -H "Content-Type: text/plain" \\
  ${origin}/api/ingest/nmea`,
    },
    {
      name: 'TCP: for receivers that can open a plain stream',
      words:
        'Host and port below; the first line says the key, then come the sentences (GGA every second; RMC or ZDA for the date).',
      text: `${host}:10110
KEY ${key}`,
    },
    {
      name: 'The sender: for a receiver on a serial line or a local port',
      words: 'Keeps sentences on its disk while there is no connection, and forwards them in order later.',
      text: `npm run replay -- --serial /dev/ttyUSB0 --baud 115200 --url ${origin} --key ${key}`,
    },
  ];
}
