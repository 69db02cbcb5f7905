export interface ComplexNumber {
  readonly re: number;
  readonly im: number;
}
