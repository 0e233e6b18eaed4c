/** Zones of clinics in seven countries, and zones of the world whose clocks are hard to get right. */

/** United States, with the zones that never change. */
export const zonesUnitedStates = [
  'America/New_York',
  'America/Detroit',
  'America/Indiana/Indianapolis',
  'America/Chicago',
  'America/Denver',
  'America/Boise',
  'America/Phoenix',
  'America/Los_Angeles',
  'America/Anchorage',
  'America/Adak',
  'Pacific/Honolulu',
  'America/Puerto_Rico',
] as const;

export const zonesCanada = [
  'America/St_Johns',
  'America/Halifax',
  'America/Toronto',
  'America/Winnipeg',
  'America/Regina',
  'America/Edmonton',
  'America/Vancouver',
  'America/Whitehorse',
] as const;

export const zonesAustralia = [
  'Australia/Sydney',
  'Australia/Melbourne',
  'Australia/Hobart',
  'Australia/Adelaide',
  'Australia/Lord_Howe',
  'Australia/Brisbane',
  'Australia/Darwin',
  'Australia/Perth',
  'Australia/Eucla',
] as const;

export const zonesBrazil = [
  'America/Noronha',
  'America/Sao_Paulo',
  'America/Fortaleza',
  'America/Manaus',
  'America/Rio_Branco',
] as const;

export const clinicZones: readonly string[] = [
  ...zonesUnitedStates,
  ...zonesCanada,
  ...zonesAustralia,
  ...zonesBrazil,
  'Europe/London',
  'Africa/Johannesburg',
  'Asia/Kolkata',
];

/**
 * Quarter and half hours, changes of half an hour and of two hours, changes at midnight, clocks that
 * go back for a month of fasting, a date line, and zones whose rules changed since 2020.
 */
export const difficultZones: readonly string[] = [
  'Pacific/Chatham',
  'Pacific/Apia',
  'Pacific/Kiritimati',
  'Pacific/Auckland',
  'Pacific/Fiji',
  'Pacific/Easter',
  'America/Santiago',
  'America/Asuncion',
  'America/Havana',
  'America/Nuuk',
  'America/Caracas',
  'America/Port-au-Prince',
  'Atlantic/Azores',
  'Africa/Casablanca',
  'Africa/Cairo',
  'Africa/Juba',
  'Africa/Addis_Ababa',
  'Asia/Beirut',
  'Asia/Gaza',
  'Asia/Amman',
  'Asia/Tehran',
  'Asia/Kabul',
  'Asia/Kathmandu',
  'Asia/Yangon',
  'Asia/Almaty',
  'Asia/Tokyo',
  'Asia/Manila',
  'Europe/Chisinau',
  'Europe/Volgograd',
  'Antarctica/Troll',
];
