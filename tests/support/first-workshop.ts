/** What the first person to open an empty installation types to create the workshop. */
export const firstWorkshop = {
  workshopName: 'Quay Street Cells',
  zone: 'Europe/Lisbon',
  name: 'Alva Reis',
  email: 'alva@example.com',
  password: 'seven lamps over the slipway',
};
