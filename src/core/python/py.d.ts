/** Python source as text; the bundler and the test runner load it so. */
declare module '*.py' {
  const text: string;
  export default text;
}
