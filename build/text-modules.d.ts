// Files that the bundler hands over as text.
declare module "*.py" {
  const text: string;
  export default text;
}
