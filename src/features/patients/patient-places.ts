/** The addresses of the patients' pages. */
export const recordPlace = (patientId: string): string => `/caseload/${patientId}`;

export const editPlace = (patientId: string): string => `/caseload/${patientId}/edit`;

export const letterPlace = (invitationId: string): string => `/letters/${invitationId}`;

/** The same invitation as a code to be read by the patient's own phone, at the clinic. */
export const phonePlace = (invitationId: string): string => `/letters/${invitationId}/phone`;
