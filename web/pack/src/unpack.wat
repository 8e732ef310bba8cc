;; Unpacks a raw LZMA stream (lc=3, lp=0, pb=0, its length known): what the browser cannot do by itself, and a quarter
;; smaller than what it can. After the public LZMA specification; the names of the tables are ours.
;;
;; Memory: from 0 on the odds, two bytes each, all 1024 at the start; the stream and the room for the result where the
;; caller put them. Odds: 0 match, 12 repeat, 24 repeat 1, 36 repeat 2, 48 repeat 3, 60 short repeat (12 each, one a
;; state), 72 slots (4 × 64), 328 positions (128), 456 alignment (16), 472 lengths of matches (274), 746 lengths of
;; repeats (274), 1020 literals (8 × 768).
(module
  (import "" "memory" (memory 1))
  (global $range (mut i32) (i32.const -1))
  (global $code (mut i32) (i32.const 0))
  (global $next (mut i32) (i32.const 0))
  (global $start (mut i32) (i32.const 0))
  (global $to (mut i32) (i32.const 0))
  (global $state (mut i32) (i32.const 0))
  (global $r0 (mut i32) (i32.const 0))
  (global $r1 (mut i32) (i32.const 0))
  (global $r2 (mut i32) (i32.const 0))
  (global $r3 (mut i32) (i32.const 0))

  (func $byte
    (global.set $code (i32.or (i32.shl (global.get $code) (i32.const 8)) (i32.load8_u (global.get $next))))
    (global.set $next (i32.add (global.get $next) (i32.const 1))))

  (func $refill
    (if (i32.lt_u (global.get $range) (i32.const 0x1000000))
      (then
        (global.set $range (i32.shl (global.get $range) (i32.const 8)))
        (call $byte))))

  ;; BIT: one bit $b by the odds whose address is $i; the odds follow what was met. Written out where it is met, because a call for
  ;; each bit takes twice the time.
  (func $bit (param $i i32) (result i32)
    (local $odds i32) (local $bound i32) (local $mask i32) (local $b i32) (local $range i32) (local $code i32)
    (local.set $i (i32.shl (local.get $i) (i32.const 1)))
    (local.set $range (global.get $range)) (local.set $code (global.get $code))
    BIT
    (global.set $range (local.get $range)) (global.set $code (local.get $code))
    (local.get $b))

  ;; Bits from the highest on, until $m reaches $top; the result still has the one in front.
  (func $tree (param $base i32) (param $m i32) (param $top i32) (result i32)
    (local $i i32) (local $odds i32) (local $bound i32) (local $mask i32) (local $b i32) (local $range i32) (local $code i32)
    (local.set $range (global.get $range)) (local.set $code (global.get $code))
    (loop $more
      (local.set $i (i32.shl (i32.add (local.get $base) (local.get $m)) (i32.const 1)))
      BIT
      (local.set $m (i32.or (i32.shl (local.get $m) (i32.const 1)) (local.get $b)))
      (br_if $more (i32.lt_u (local.get $m) (local.get $top))))
    (global.set $range (local.get $range)) (global.set $code (local.get $code))
    (local.get $m))

  ;; So many bits from the lowest on.
  (func $reverse (param $base i32) (param $bits i32) (result i32)
    (local $m i32) (local $b i32) (local $n i32) (local $value i32)
    (local.set $m (i32.const 1))
    (loop $more
      (local.set $b (call $bit (i32.add (local.get $base) (local.get $m))))
      (local.set $m (i32.or (i32.shl (local.get $m) (i32.const 1)) (local.get $b)))
      (local.set $value (i32.or (local.get $value) (i32.shl (local.get $b) (local.get $n))))
      (local.set $n (i32.add (local.get $n) (i32.const 1)))
      (br_if $more (i32.lt_u (local.get $n) (local.get $bits))))
    (local.get $value))

  (func $length (param $base i32) (result i32)
    (if (i32.eqz (call $bit (local.get $base)))
      (then (return (i32.sub (call $tree (i32.add (local.get $base) (i32.const 2)) (i32.const 1) (i32.const 8)) (i32.const 6)))))
    (if (i32.eqz (call $bit (i32.add (local.get $base) (i32.const 1))))
      (then (return (i32.add (call $tree (i32.add (local.get $base) (i32.const 10)) (i32.const 1) (i32.const 8)) (i32.const 2)))))
    (i32.sub (call $tree (i32.add (local.get $base) (i32.const 18)) (i32.const 1) (i32.const 256)) (i32.const 238)))

  ;; How far back a match of this length lies, less one.
  (func $distance (param $length i32) (result i32)
    (local $slot i32) (local $bits i32) (local $base i32) (local $value i32)
    (if (i32.gt_u (local.get $length) (i32.const 5)) (then (local.set $length (i32.const 5))))
    (local.set $slot (i32.sub
      (call $tree
        (i32.add (i32.const 72) (i32.shl (i32.sub (local.get $length) (i32.const 2)) (i32.const 6)))
        (i32.const 1) (i32.const 64))
      (i32.const 64)))
    (if (i32.lt_u (local.get $slot) (i32.const 4)) (then (return (local.get $slot))))
    (local.set $bits (i32.sub (i32.shr_u (local.get $slot) (i32.const 1)) (i32.const 1)))
    (local.set $base (i32.shl (i32.or (i32.const 2) (i32.and (local.get $slot) (i32.const 1))) (local.get $bits)))
    (if (i32.lt_u (local.get $slot) (i32.const 14))
      (then (return (i32.add (local.get $base)
        (call $reverse (i32.sub (i32.add (i32.const 328) (local.get $base)) (local.get $slot)) (local.get $bits))))))
    (local.set $bits (i32.sub (local.get $bits) (i32.const 4)))
    (loop $more
      (global.set $range (i32.shr_u (global.get $range) (i32.const 1)))
      (local.set $value (i32.shl (local.get $value) (i32.const 1)))
      (if (i32.ge_u (global.get $code) (global.get $range))
        (then
          (global.set $code (i32.sub (global.get $code) (global.get $range)))
          (local.set $value (i32.or (local.get $value) (i32.const 1)))))
      (call $refill)
      (local.set $bits (i32.sub (local.get $bits) (i32.const 1)))
      (br_if $more (local.get $bits)))
    (i32.add (local.get $base)
      (i32.add (i32.shl (local.get $value) (i32.const 4)) (call $reverse (i32.const 456) (i32.const 4)))))

  ;; A byte that stands for itself; after a match it is foretold by the byte that would have followed there.
  (func $literal (param $base i32) (param $foretold i32) (param $matched i32) (result i32)
    (local $m i32) (local $x i32)
    (local $i i32) (local $odds i32) (local $bound i32) (local $mask i32) (local $b i32) (local $range i32) (local $code i32)
    (local.set $m (i32.const 1))
    (if (local.get $matched)
      (then
        (local.set $range (global.get $range)) (local.set $code (global.get $code))
        (loop $more
          (local.set $foretold (i32.shl (local.get $foretold) (i32.const 1)))
          (local.set $x (i32.and (local.get $foretold) (i32.const 256)))
          (local.set $i (i32.shl
            (i32.add (i32.add (local.get $base) (i32.const 256)) (i32.add (local.get $x) (local.get $m)))
            (i32.const 1)))
          BIT
          (local.set $m (i32.or (i32.shl (local.get $m) (i32.const 1)) (local.get $b)))
          (br_if $more (i32.and
            (i32.lt_u (local.get $m) (i32.const 256))
            (i32.eq (i32.shr_u (local.get $x) (i32.const 8)) (local.get $b)))))
        (global.set $range (local.get $range)) (global.set $code (local.get $code))
        (if (i32.ge_u (local.get $m) (i32.const 256)) (then (return (local.get $m))))))
    (call $tree (local.get $base) (local.get $m) (i32.const 256)))

  ;; Begins with the stream at $from, whose result goes to $to.
  (func (export "begin") (param $from i32) (param $to i32)
    (global.set $start (local.get $to))
    (global.set $to (local.get $to))
    (global.set $next (i32.add (local.get $from) (i32.const 1)))
    (call $byte) (call $byte) (call $byte) (call $byte))

  ;; Goes on until the result reaches $end or a little beyond; gives where it ends.
  (func (export "unpack") (param $end i32) (result i32)
    (local $to i32) (local $start i32) (local $state i32) (local $length i32) (local $d i32)
    (local $r0 i32) (local $r1 i32) (local $r2 i32) (local $r3 i32)
    (local.set $to (global.get $to)) (local.set $start (global.get $start)) (local.set $state (global.get $state))
    (local.set $r0 (global.get $r0)) (local.set $r1 (global.get $r1))
    (local.set $r2 (global.get $r2)) (local.set $r3 (global.get $r3))
    (block $done
      (loop $more
        (br_if $done (i32.ge_u (local.get $to) (local.get $end)))
        (if (i32.eqz (call $bit (local.get $state)))
          (then
            (i32.store8 (local.get $to)
              (call $literal
                (i32.add (i32.const 1020) (i32.mul (i32.const 768)
                  (if (result i32) (i32.eq (local.get $to) (local.get $start))
                    (then (i32.const 0))
                    (else (i32.shr_u (i32.load8_u (i32.sub (local.get $to) (i32.const 1))) (i32.const 5))))))
                (i32.load8_u (i32.sub (i32.sub (local.get $to) (local.get $r0)) (i32.const 1)))
                (i32.ge_u (local.get $state) (i32.const 7))))
            (local.set $to (i32.add (local.get $to) (i32.const 1)))
            (local.set $state
              (if (result i32) (i32.lt_u (local.get $state) (i32.const 4))
                (then (i32.const 0))
                (else (i32.sub (local.get $state)
                  (if (result i32) (i32.lt_u (local.get $state) (i32.const 10)) (then (i32.const 3)) (else (i32.const 6)))))))
            (br $more)))
        (if (call $bit (i32.add (local.get $state) (i32.const 12)))
          (then
            (if (call $bit (i32.add (local.get $state) (i32.const 24)))
              (then
                (local.set $d (local.get $r1))
                (if (call $bit (i32.add (local.get $state) (i32.const 36)))
                  (then
                    (local.set $d (local.get $r2))
                    (if (call $bit (i32.add (local.get $state) (i32.const 48)))
                      (then (local.set $d (local.get $r3)) (local.set $r3 (local.get $r2))))
                    (local.set $r2 (local.get $r1))))
                (local.set $r1 (local.get $r0))
                (local.set $r0 (local.get $d)))
              (else
                (if (i32.eqz (call $bit (i32.add (local.get $state) (i32.const 60))))
                  (then
                    (local.set $state (select (i32.const 9) (i32.const 11) (i32.lt_u (local.get $state) (i32.const 7))))
                    (i32.store8 (local.get $to)
                      (i32.load8_u (i32.sub (i32.sub (local.get $to) (local.get $r0)) (i32.const 1))))
                    (local.set $to (i32.add (local.get $to) (i32.const 1)))
                    (br $more)))))
            (local.set $length (call $length (i32.const 746)))
            (local.set $state (select (i32.const 8) (i32.const 11) (i32.lt_u (local.get $state) (i32.const 7)))))
          (else
            (local.set $r3 (local.get $r2))
            (local.set $r2 (local.get $r1))
            (local.set $r1 (local.get $r0))
            (local.set $length (call $length (i32.const 472)))
            (local.set $state (select (i32.const 7) (i32.const 10) (i32.lt_u (local.get $state) (i32.const 7))))
            (local.set $r0 (call $distance (local.get $length)))))
        (loop $copy
          (i32.store8 (local.get $to)
            (i32.load8_u (i32.sub (i32.sub (local.get $to) (local.get $r0)) (i32.const 1))))
          (local.set $to (i32.add (local.get $to) (i32.const 1)))
          (local.set $length (i32.sub (local.get $length) (i32.const 1)))
          (br_if $copy (local.get $length)))
        (br $more)))
    (global.set $to (local.get $to)) (global.set $state (local.get $state))
    (global.set $r0 (local.get $r0)) (global.set $r1 (local.get $r1))
    (global.set $r2 (local.get $r2)) (global.set $r3 (local.get $r3))
    (local.get $to)))
