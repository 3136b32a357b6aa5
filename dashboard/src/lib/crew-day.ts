/** All days of crews begin with this key. */
export const crewDayKey = ['crewDay'] as const;
