;; Unpacks the page: several raw LZMA streams (lc=2, lp=0, pb=0, their lengths known), of which the first and the last are text
;; and the others the instructions of the program, taken apart by what they are (streams.rs) and joined here again. After the
;; public LZMA and WebAssembly specifications; the names of the tables are ours.
;;
;; Memory: from 0 on the odds of the stream at work, two bytes each: 0 match, 12 repeat, 24 repeat 1, 36 repeat 2, 48 repeat 3, 60
;; short repeat (12 each, one a state), 72 slots (4 × 64), 328 positions (128), 456 alignment (16), 472 lengths of matches (274), 746
;; lengths of repeats (274), 1020 literals (4 × 768). From 8192 on how each of 256 instructions is read (streams.rs); from 8448 on where
;; the reader of each stream stands, four bytes each. Packed streams and room for the result where the caller put them; behind them a
;; desk of 8320 bytes for each stream (its odds while it rests, then next, range, code, to, start, state, four distances and where it
;; ends), and the streams of instructions.
(module
  (import "" "memory" (memory 1))
  (global $range (mut i32) (i32.const -1))
  (global $code (mut i32) (i32.const 0))
  (global $next (mut i32) (i32.const 0))
  ;; Where the result goes on, where its first part ends, and how many functions are still to come.
  (global $out (mut i32) (i32.const 0))
  (global $front (mut i32) (i32.const 0))
  (global $functions (mut i32) (i32.const 0))
  ;; The desks of the streams, and from where on their stock is looked after again.
  (global $desks (mut i32) (i32.const 0))
  (global $mark (mut i32) (i32.const 0))

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

  ;; Goes on with a stream until its result reaches $end or a little beyond; gives where that is.
  (func $go (param $stream i32) (param $end i32) (result i32)
    (local $to i32) (local $start i32) (local $state i32) (local $length i32) (local $d i32) (local $desk i32)
    (local $r0 i32) (local $r1 i32) (local $r2 i32) (local $r3 i32)
    (local.set $desk (i32.add (global.get $desks) (i32.mul (local.get $stream) (i32.const 8320))))
    (memory.copy (i32.const 0) (local.get $desk) (i32.const 8192))
    (global.set $next (i32.load offset=8192 (local.get $desk)))
    (global.set $range (i32.load offset=8196 (local.get $desk)))
    (global.set $code (i32.load offset=8200 (local.get $desk)))
    (local.set $to (i32.load offset=8204 (local.get $desk)))
    (local.set $start (i32.load offset=8208 (local.get $desk)))
    (local.set $state (i32.load offset=8212 (local.get $desk)))
    (local.set $r0 (i32.load offset=8216 (local.get $desk)))
    (local.set $r1 (i32.load offset=8220 (local.get $desk)))
    (local.set $r2 (i32.load offset=8224 (local.get $desk)))
    (local.set $r3 (i32.load offset=8228 (local.get $desk)))
    (if (i32.gt_u (local.get $end) (i32.load offset=8232 (local.get $desk)))
      (then (local.set $end (i32.load offset=8232 (local.get $desk)))))
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
                    (else (i32.shr_u (i32.load8_u (i32.sub (local.get $to) (i32.const 1))) (i32.const 6))))))
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
    (memory.copy (local.get $desk) (i32.const 0) (i32.const 8192))
    (i32.store offset=8192 (local.get $desk) (global.get $next))
    (i32.store offset=8196 (local.get $desk) (global.get $range))
    (i32.store offset=8200 (local.get $desk) (global.get $code))
    (i32.store offset=8204 (local.get $desk) (local.get $to))
    (i32.store offset=8212 (local.get $desk) (local.get $state))
    (i32.store offset=8216 (local.get $desk) (local.get $r0))
    (i32.store offset=8220 (local.get $desk) (local.get $r1))
    (i32.store offset=8224 (local.get $desk) (local.get $r2))
    (i32.store offset=8228 (local.get $desk) (local.get $r3))
    (local.get $to))

  ;; The desk of a stream, ready to begin with what is packed at $next; the result goes to $to.
  (func $lay (param $stream i32) (param $next i32) (param $to i32) (param $end i32)
    (local $desk i32) (local $i i32)
    (local.set $desk (i32.add (global.get $desks) (i32.mul (local.get $stream) (i32.const 8320))))
    (loop $more
      (i32.store16 (i32.add (local.get $desk) (local.get $i)) (i32.const 1024))
      (br_if $more (i32.lt_u (local.tee $i (i32.add (local.get $i) (i32.const 2))) (i32.const 8192))))
    (global.set $next (i32.add (local.get $next) (i32.const 1)))
    (call $byte) (call $byte) (call $byte) (call $byte)
    (i32.store offset=8192 (local.get $desk) (global.get $next))
    (i32.store offset=8196 (local.get $desk) (i32.const -1))
    (i32.store offset=8200 (local.get $desk) (global.get $code))
    (i32.store offset=8204 (local.get $desk) (local.get $to))
    (i32.store offset=8208 (local.get $desk) (local.get $to))
    (i32.store offset=8232 (local.get $desk) (local.get $end))
    (i32.store offset=8448 (i32.shl (local.get $stream) (i32.const 2)) (local.get $to)))

  ;; Begins with what is packed at $from: the number of functions, the length of their bodies; for each stream its lengths
  ;; packed and unpacked; the streams. The result goes to $to.
  (func (export "begin") (param $from i32) (param $to i32)
    (local $next i32) (local $stream i32) (local $own i32) (local $size i32) (local $at i32)
    (global.set $functions (i32.load (local.get $from)))
    (local.set $next (i32.add (local.get $from) (i32.const HEAD)))
    ;; Room for as much as the result has and a quarter of a megabyte: more than the streams of instructions and the desks take.
    (global.set $desks (i32.shl (memory.size) (i32.const 16)))
    (drop (memory.grow (i32.add (i32.shr_u (i32.load offset=4 (local.get $from)) (i32.const 16)) (i32.const 5))))
    (local.set $own (i32.add (global.get $desks) (i32.mul (i32.const 8320) (i32.add (i32.const LAST) (i32.const 1)))))
    (global.set $out (local.get $to))
    (loop $more
      (local.set $size (i32.load offset=12 (local.get $from)))
      (local.set $at (local.get $own))
      (if (i32.eqz (local.get $stream))
        (then
          (local.set $at (local.get $to))
          (global.set $front (i32.add (local.get $to) (local.get $size)))
          (local.set $to (i32.add (global.get $front) (i32.load offset=4 (local.get $from))))))
      (if (i32.eq (local.get $stream) (i32.const LAST)) (then (local.set $at (local.get $to))))
      (call $lay (local.get $stream) (local.get $next) (local.get $at) (i32.add (local.get $at) (local.get $size)))
      (if (i32.eq (local.get $at) (local.get $own)) (then (local.set $own (i32.add (local.get $own) (local.get $size)))))
      (local.set $next (i32.add (local.get $next) (i32.load offset=8 (local.get $from))))
      (local.set $from (i32.add (local.get $from) (i32.const 8)))
      (br_if $more (i32.le_u (local.tee $stream (i32.add (local.get $stream) (i32.const 1))) (i32.const LAST)))))

  ;; Unpacks each stream of instructions until it has 128 kB in stock: more than the longest function and what is joined before
  ;; this is called again.
  (func $stock
    (local $stream i32) (local $desk i32) (local $to i32) (local $wanted i32)
    (local.set $stream (i32.const 1))
    (local.set $desk (i32.add (global.get $desks) (i32.const 8320)))
    (loop $more
      (local.set $to (i32.load offset=8204 (local.get $desk)))
      (local.set $wanted (i32.add
        (i32.load offset=8448 (i32.shl (local.get $stream) (i32.const 2)))
        (i32.const 131072)))
      (if (i32.and
            (i32.lt_u (local.get $to) (i32.load offset=8232 (local.get $desk)))
            (i32.lt_u (local.get $to) (local.get $wanted)))
        (then (drop (call $go (local.get $stream) (i32.add (local.get $wanted) (i32.const 65536))))))
      (local.set $desk (i32.add (local.get $desk) (i32.const 8320)))
      (br_if $more (i32.lt_u (local.tee $stream (i32.add (local.get $stream) (i32.const 1))) (i32.const LAST)))))

  ;; The next function: its declarations, its instructions with what follows each, and in front of them its size.
  (func $join
    (local $body i32) (local $out i32) (local $codes i32) (local $code i32) (local $depth i32)
    (local $stream i32) (local $count i32) (local $at i32) (local $byte i32)
    (local.set $body (i32.add (global.get $out) (i32.const 3)))
    (local.set $out (local.get $body))
    (local.set $codes (i32.load offset=8448 (i32.const 4)))
    (local.set $stream (i32.const 2))
    (local.set $count (i32.add (i32.shl (i32.load8_u (i32.load offset=8448 (i32.const 8))) (i32.const 1)) (i32.const 1)))
    (block $done
      (loop $more
        ;; So many numbers from a stream.
        (if (local.get $count)
          (then
            (local.set $stream (i32.shl (local.get $stream) (i32.const 2)))
            (local.set $at (i32.load offset=8448 (local.get $stream)))
            (loop $again
              (i32.store8 (local.get $out) (local.tee $byte (i32.load8_u (local.get $at))))
              (local.set $out (i32.add (local.get $out) (i32.const 1)))
              (local.set $at (i32.add (local.get $at) (i32.const 1)))
              (br_if $again (i32.ge_u (local.get $byte) (i32.const 128)))
              (br_if $again (local.tee $count (i32.sub (local.get $count) (i32.const 1)))))
            (i32.store offset=8448 (local.get $stream) (local.get $at))))
        (loop $plain
          (i32.store8 (local.get $out) (local.tee $code (i32.load8_u (local.get $codes))))
          (local.set $out (i32.add (local.get $out) (i32.const 1)))
          (local.set $codes (i32.add (local.get $codes) (i32.const 1)))
          (br_if $plain (i32.eqz
            (local.tee $stream (i32.and (i32.load8_u offset=8192 (local.get $code)) (i32.const 15))))))
        (local.set $count (i32.const 1))
        (block $memory (block $address (block $constant (block $targets (block $float (block $two (block $second (block $block (block $end
          (br_table $end $block $end $more $memory $memory $more $more $more $more $float $targets $constant $two $second $address
            (local.get $stream)))
          ;; $end
          (br_if $done (i32.eqz (local.get $depth)))
          (local.set $depth (i32.sub (local.get $depth) (i32.const 1)))
          (local.set $count (i32.const 0))
          (br $more))
          ;; $block
          (local.set $depth (i32.add (local.get $depth) (i32.const 1)))
          (i32.store8 (local.get $out) (i32.load8_u (local.get $codes)))
          (local.set $out (i32.add (local.get $out) (i32.const 1)))
          (local.set $codes (i32.add (local.get $codes) (i32.const 1)))
          (local.set $count (i32.const 0))
          (br $more))
          ;; $second: no number up to 7; two behind 8, 10, 12 and 14; else one.
          (i32.store8 (local.get $out) (local.tee $code (i32.load8_u (local.get $codes))))
          (local.set $out (i32.add (local.get $out) (i32.const 1)))
          (local.set $codes (i32.add (local.get $codes) (i32.const 1)))
          (local.set $stream (i32.const 8))
          (local.set $count (i32.add
            (i32.ge_u (local.get $code) (i32.const 8))
            (i32.and (i32.shr_u (i32.const 0x5500) (local.get $code)) (i32.const 1))))
          (br $more))
          ;; $two
          (local.set $stream (i32.const 8))
          (local.set $count (i32.const 2))
          (br $more))
          ;; $float: eight bytes, or four behind code 0x43.
          (local.set $count (i32.shl (i32.sub (local.get $code) (i32.const 0x42)) (i32.const 2)))
          (memory.copy (local.get $out) (i32.load offset=8448 (i32.const 40)) (local.get $count))
          (i32.store offset=8448 (i32.const 40) (i32.add (i32.load offset=8448 (i32.const 40)) (local.get $count)))
          (local.set $out (i32.add (local.get $out) (local.get $count)))
          (local.set $count (i32.const 0))
          (br $more))
          ;; $targets: behind their number less one, which has one byte.
          (local.set $count (i32.add (i32.load8_u (i32.load offset=8448 (i32.const 44))) (i32.const 2)))
          (br $more))
          ;; $constant: by the class of the instruction after it.
          (local.set $stream (i32.add (local.get $stream)
            (i32.shr_u (i32.load8_u offset=8192 (i32.load8_u (local.get $codes))) (i32.const 4))))
          (br $more))
        ;; $address: a constant, whose code is put right.
        (i32.store8 (i32.sub (local.get $out) (i32.const 1)) (i32.const 0x41))
        (local.set $stream (i32.const ADDRESSES))
        (br $more))
        ;; $memory: two bits say how a load or store is aligned.
        (i32.store8 (local.get $out) (i32.and (i32.const 3) (i32.wrap_i64 (i64.shr_u
          (i64.const ALIGNMENTS)
          (i64.extend_i32_u (i32.shl (i32.sub (local.get $code) (i32.const 0x28)) (i32.const 1)))))))
        (local.set $out (i32.add (local.get $out) (i32.const 1)))
        (br $more)))
    (i32.store offset=8448 (i32.const 4) (local.get $codes))
    ;; The size has three bytes at most; what follows it moves up.
    (local.set $count (i32.sub (local.get $out) (local.get $body)))
    (local.set $out (global.get $out))
    (local.set $code (local.get $count))
    (loop $more
      (i32.store8 (local.get $out) (i32.or
        (i32.and (local.get $code) (i32.const 127))
        (i32.shl (i32.gt_u (local.get $code) (i32.const 127)) (i32.const 7))))
      (local.set $out (i32.add (local.get $out) (i32.const 1)))
      (br_if $more (local.tee $code (i32.shr_u (local.get $code) (i32.const 7)))))
    (memory.copy (local.get $out) (local.get $body) (local.get $count))
    (global.set $out (i32.add (local.get $out) (local.get $count))))

  ;; Goes on until the result reaches $end or a little beyond, or a part of it ends; gives where it ends.
  (func (export "unpack") (param $end i32) (result i32)
    (if (i32.lt_u (global.get $out) (global.get $front))
      (then
        (global.set $out (call $go (i32.const 0) (local.get $end)))
        (return (global.get $out))))
    (if (i32.eqz (global.get $functions))
      (then
        (global.set $out (call $go (i32.const LAST) (local.get $end)))
        (return (global.get $out))))
    (loop $more
      (if (i32.ge_u (global.get $out) (global.get $mark))
        (then
          (call $stock)
          (global.set $mark (i32.add (global.get $out) (i32.const 16384)))))
      (call $join)
      (global.set $functions (i32.sub (global.get $functions) (i32.const 1)))
      (br_if $more (i32.and
        (i32.lt_u (global.get $out) (local.get $end))
        (i32.ne (global.get $functions) (i32.const 0)))))
    (global.get $out))

  (data (i32.const 8192) "TABLE"))
