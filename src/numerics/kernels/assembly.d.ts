// What resources/build/assemblyPlugin.ts makes of an assembly source: its binary, base64.
declare module "*.ts?wasm" {
  const binary: string;
  export default binary;
}
