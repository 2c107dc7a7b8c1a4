/** A complex number for second methods: slow and plain. */
export class Complex {
  readonly re: number;
  readonly im: number;

  constructor(re: number, im = 0) {
    this.re = re;
    this.im = im;
  }

  plus(other: Complex): Complex {
    return new Complex(this.re + other.re, this.im + other.im);
  }

  minus(other: Complex): Complex {
    return new Complex(this.re - other.re, this.im - other.im);
  }

  times(other: Complex | number): Complex {
    if (typeof other === 'number') return new Complex(this.re * other, this.im * other);
    return new Complex(this.re * other.re - this.im * other.im, this.re * other.im + this.im * other.re);
  }

  inverse(): Complex {
    const square = this.re * this.re + this.im * this.im;
    return new Complex(this.re / square, -this.im / square);
  }

  over(other: Complex): Complex {
    return this.times(other.inverse());
  }

  get size(): number {
    return Math.hypot(this.re, this.im);
  }
}
