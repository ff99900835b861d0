// Stands for the router's copy of a library that writes into the page's head: `<Head>` is not used here (lint forbids it).
export const HelmetProvider = ({ children }) => children;
export const Helmet = () => null;
