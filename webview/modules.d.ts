declare module '*.css';
declare module 'plotly.js-basic-dist-min';
