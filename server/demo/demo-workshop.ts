/** Id of the workshop that the demo is seeded into; sign-in by one tap opens this one and no other. */
export const demoWorkshopId = 'workshop-demo';
