"""The formulas of the trade. Pure: numbers in, numbers out; floats, arrays and ufloats alike."""
