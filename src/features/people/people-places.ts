export const peoplePlace = '/clinic/people';

export const personPlace = (personId: string): string => `/clinic/people/${personId}`;

export const staffLetterPlace = (invitationId: string): string => `/letters/${invitationId}`;
