/**
 * Sentences published by others, with what they say. Sources: NR "NMEA Revealed" (gpsd project); RL gpsd regression logs;
 * GN go-nmea tests; PN pynmea2 README and tests; NP NmeaParser sample log; and as noted. Checksums recomputed as valid.
 * Latitude and longitude in degrees to 1e-7; null where the sentence has no position.
 */
export const publishedGga = [
  // D. DePriest's NMEA page, and many others
  {
    id: 'E1',
    text: '$GPGGA,123519,4807.038,N,01131.000,E,1,08,0.9,545.4,M,46.9,M,,*47',
    at: [48.1173, 11.5166667],
    quality: 1,
    satellites: 8,
    hdop: 0.9,
    ageMs: null,
    stationId: null,
  },
  // PN
  {
    id: 'E2',
    text: '$GPGGA,184353.07,1929.045,S,02410.506,E,1,04,2.6,100.00,M,-33.9,M,,0000*6D',
    at: [-19.4840833, 24.1751],
    quality: 1,
    satellites: 4,
    hdop: 2.6,
    ageMs: null,
    stationId: 0,
  },
  // GN: satellites without a leading zero
  {
    id: 'E3',
    text: '$GNGGA,203415.000,6325.6138,N,01021.4290,E,1,8,2.42,72.5,M,41.5,M,,*7C',
    at: [63.4268967, 10.35715],
    quality: 1,
    satellites: 8,
    hdop: 2.42,
    ageMs: null,
    stationId: null,
  },
  // GN: negative altitude
  {
    id: 'E4',
    text: '$GPGGA,034225.077,3356.4650,S,15124.5567,E,1,03,9.7,-25.0,M,21.0,M,,0000*51',
    at: [-33.9410833, 151.4092783],
    quality: 1,
    satellites: 3,
    hdop: 9.7,
    ageMs: null,
    stationId: 0,
  },
  // NR: only twelve fields
  {
    id: 'E5',
    text: '$GNGGA,001043.00,4404.14036,N,12118.85961,W,1,12,0.98,1113.0,M,-21.3,M*47',
    at: [44.069006, -121.3143268],
    quality: 1,
    satellites: 12,
    hdop: 0.98,
    ageMs: null,
    stationId: null,
  },
  // RL nmea-rtk.log
  {
    id: 'E6',
    text: '$GNGGA,132819.60,4134.49795459,N,09345.03431408,W,2,10,0.9,278.161,M,-31.442,M,6.6,0133*6A',
    at: [41.5749659, -93.7505719],
    quality: 2,
    satellites: 10,
    hdop: 0.9,
    ageMs: 6600,
    stationId: 133,
  },
  {
    id: 'E7',
    text: '$GPGGA,132829.90,4134.49950965,N,09345.03456915,W,2,09,1.0,279.275,M,-31.442,M,14.8,0133*47',
    at: [41.5749918, -93.7505762],
    quality: 2,
    satellites: 9,
    hdop: 1,
    ageMs: 14_800,
    stationId: 133,
  },
  {
    id: 'E8',
    text: '$GNGGA,133859.80,4134.50180205,N,09345.03586649,W,4,19,0.7,280.827,M,-31.442,M,5.8,0002*6D',
    at: [41.57503, -93.7505978],
    quality: 4,
    satellites: 19,
    hdop: 0.7,
    ageMs: 5800,
    stationId: 2,
  },
  {
    id: 'E9',
    text: '$GNGGA,133900.00,4134.50180323,N,09345.03586581,W,4,19,0.7,280.827,M,-31.442,M,6.0,0002*61',
    at: [41.5750301, -93.7505978],
    quality: 4,
    satellites: 19,
    hdop: 0.7,
    ageMs: 6000,
    stationId: 2,
  },
  // NP
  {
    id: 'E10',
    text: '$GNGGA,235647.00,3403.47162394,N,11711.80927093,W,5,10,1.2,403.600,M,-32.133,M,1.0,0000*61',
    at: [34.0578604, -117.1968212],
    quality: 5,
    satellites: 10,
    hdop: 1.2,
    ageMs: 1000,
    stationId: 0,
  },
  // RL: age 0.0 is an age
  {
    id: 'E11',
    text: '$GNGGA,231408.00,4503.94632,N,00739.54368,E,5,12,0.82,257.4,M,47.2,M,0.0,0041*64',
    at: [45.065772, 7.6590613],
    quality: 5,
    satellites: 12,
    hdop: 0.82,
    ageMs: 0,
    stationId: 41,
  },
  // a positioning-module wiki: 34 satellites, station above 1023
  {
    id: 'E12',
    text: '$GNGGA,063924.000,3037.643956,N,10348.010829,E,5,34,0.46,507.909,M,-32.181,M,1.0,3335*76',
    at: [30.6273993, 103.8001805],
    quality: 5,
    satellites: 34,
    hdop: 0.46,
    ageMs: 1000,
    stationId: 3335,
  },
  // RL
  {
    id: 'E13',
    text: '$GPGGA,165010.000,4143.6057,N,08338.0788,W,6,00,50.0,203.8,M,-33.7,M,,0000*5D',
    at: [41.7267617, -83.6346467],
    quality: 6,
    satellites: 0,
    hdop: 50,
    ageMs: null,
    stationId: 0,
  },
  {
    id: 'E14',
    text: '$GPGGA,051251.00,5742.7698833,N,01201.3559333,E,7,03,,48.07,M,37.042,M,,*4B',
    at: [57.7128314, 12.0225989],
    quality: 7,
    satellites: 3,
    hdop: null,
    ageMs: null,
    stationId: null,
  },
  {
    id: 'E15',
    text: '$GPGGA,125106,3854.5087,N,07726.4523,W,8,10,2.0,268.8,M,-33.9,M,,*7F',
    at: [38.9084783, -77.4408717],
    quality: 8,
    satellites: 10,
    hdop: 2,
    ageMs: null,
    stationId: null,
  },
  // RL: geoid separation and its unit missing
  {
    id: 'E16',
    text: '$GPGGA,204134.80,4205.737907,N,08802.034287,W,2,09,0.9,221.883,M,,,4,0138*1C',
    at: [42.0956318, -88.0339048],
    quality: 2,
    satellites: 9,
    hdop: 0.9,
    ageMs: 4000,
    stationId: 138,
  },
  // RL: age written 0000
  {
    id: 'E17',
    text: '$GPGGA,145243.000,3401.9764,N,11744.8274,W,2,10,0.87,234.7,M,-33.2,M,0000,0000*5F',
    at: [34.03294, -117.7471233],
    quality: 2,
    satellites: 10,
    hdop: 0.87,
    ageMs: 0,
    stationId: 0,
  },
  // RL: zeros are filler
  {
    id: 'E18',
    text: '$GPGGA,000410.00,0000.0000,N,00000.0000,E,0,00,0.0,,M,,M,,*58',
    at: null,
    quality: 0,
    satellites: 0,
    hdop: 0,
    ageMs: null,
    stationId: null,
  },
  // RL: empty position, one comma too many
  {
    id: 'E19',
    text: '$GNGGA,074150.799,,,,,0,00,,,M,0.0,M,,0000,*64',
    at: null,
    quality: 0,
    satellites: 0,
    hdop: null,
    ageMs: null,
    stationId: 0,
  },
  // hobby-board setup guide
  {
    id: 'E20',
    text: '$GPGGA,083217.00,,,,,0,00,99.99,,,,,,*69',
    at: null,
    quality: 0,
    satellites: 0,
    hdop: 99.99,
    ageMs: null,
    stationId: null,
  },
] as const;

/** GST, RMC and ZDA: day is days since 1970-01-01. */
export const publishedOthers = [
  {
    id: 'S1',
    text: '$GPGST,182141.000,15.5,15.3,7.2,21.8,0.9,0.5,0.8*54',
    type: 'gst',
    sigmas: [0.9, 0.5, 0.8],
  }, // NR
  {
    id: 'S2',
    text: '$GPGST,172814.0,0.006,0.023,0.020,273.6,0.023,0.020,0.031*6A',
    type: 'gst',
    sigmas: [0.023, 0.02, 0.031],
  }, // PN
  { id: 'S3', text: '$GNGST,181141.00,46,,,,4.7,1.9,5.3*4A', type: 'gst', sigmas: [4.7, 1.9, 5.3] }, // RL
  {
    id: 'R1',
    text: '$GNRMC,133900.00,A,4134.50180323,N,09345.03586581,W,0.008,0.000,180320,11.5982,E,D*31',
    type: 'date',
    date: '2020-03-18',
    valid: true,
  }, // RL
  {
    id: 'R2',
    text: '$GPRMC,173138.000,V,3145.5214,N,09704.5057,W,000.0,000.0,170318,000.0,E,N*00',
    type: 'date',
    date: '2018-03-17',
    valid: false,
  }, // NemaTode issue 3
  {
    id: 'R3',
    text: '$GPRMC,235960,A,4916.45,N,12311.12,W,0.0,0.0,311216,,*0A',
    type: 'date',
    date: '2016-12-31',
    valid: true,
  }, // a Rust library's tests
  { id: 'Z1', text: '$GPZDA,160012.71,11,03,2004,-1,00*7D', type: 'date', date: '2004-03-11', valid: true }, // NR
] as const;

/** A logger app's unit test has this; its characters give 56. */
export const publishedInvalid = '$GPGGA,,,,,,,,,,,,,,*47';
