def smooth_length(n):
    """Smallest whole number of at least n without a prime factor above 5."""
    m = math.ceil(n)
    while True:
        rest = m
        for p in (2, 3, 5):
            while rest % p == 0:
                rest //= p
        if rest == 1:
            return m
        m += 1
