/** The numbers of AssemblyScript, as TypeScript sees them: the steps are compiled by both. */
type i32 = number;
type f64 = number;
