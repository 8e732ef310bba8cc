;; One bit $b by the odds whose address is $i; the odds follow what was met. Stands for BIT in unpack.wat: a call for each bit
;; would take longer. Without branches, which nobody can foretell: b = code ≥ bound;
;; range = b ? range − bound : bound; code = code − b bound; odds = b ? odds − odds/32 : odds + (2048 − odds)/32.
(local.set $bound (i32.mul (i32.shr_u (local.get $range) (i32.const 11)) (local.tee $odds (i32.load16_u (local.get $i)))))
(local.set $b (i32.ge_u (local.get $code) (local.get $bound)))
(local.set $mask (i32.sub (i32.const 0) (local.get $b)))
(i32.store16 (local.get $i)
  (i32.sub (local.get $odds)
    (i32.shr_s
      (i32.add (local.get $odds) (i32.and (i32.sub (local.get $b) (i32.const 1)) (i32.const -2017)))
      (i32.const 5))))
(local.set $code (i32.sub (local.get $code) (i32.and (local.get $bound) (local.get $mask))))
(local.set $range (i32.add (local.get $bound)
  (i32.and (i32.sub (i32.sub (local.get $range) (local.get $bound)) (local.get $bound)) (local.get $mask))))
(if (i32.lt_u (local.get $range) (i32.const 0x1000000))
  (then
    (local.set $range (i32.shl (local.get $range) (i32.const 8)))
    (local.set $code (i32.or (i32.shl (local.get $code) (i32.const 8)) (i32.load8_u (global.get $next))))
    (global.set $next (i32.add (global.get $next) (i32.const 1)))))
