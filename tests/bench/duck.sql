-- The cameras and lenses of a market that fit the brief LIDS: how many pairs, and the best hundred by grade, price and
-- latitude. Every value is stated, nothing is unknown, no camera has rings, and line-scan cameras can't stand still.
WITH camera AS (
    SELECT id, price, CASE mount WHEN 'CS' THEN 'C' ELSE mount END AS thread, "flange distance [mm]" AS flange,
        "pixel pitch [µm]" / 1000 AS pitch,
        "pixels wide" * "pixel pitch [µm]" / 1000 AS wide,
        "pixels high" * "pixel pitch [µm]" / 1000 AS high,
        CASE colour WHEN 'colour' THEN 1.4 ELSE 1.0 END AS mosaic
    FROM cameras
    WHERE kind = 'area'
),
-- cameras that are optically the same
sensor AS MATERIALIZED (
    SELECT row_number() OVER () AS number, * FROM (
        SELECT thread, flange, pitch, wide, high, mosaic, count(*) AS cameras, min(price) AS price
        FROM camera
        GROUP BY ALL
    )
),
-- each both ways round
turned AS (
    SELECT *, false AS portrait, wide AS w, high AS h FROM sensor
    UNION ALL
    SELECT *, true, high, wide FROM sensor
),
lens AS (
    SELECT id, price, CASE mount WHEN 'CS' THEN 'C' ELSE mount END AS thread, "flange distance [mm]" AS flange,
        "image circle [mm]" AS circle, stops, "detail limit [lp/mm]" AS detail,
        kind = 'telecentric' AS telecentric, "focal length [mm]" AS f, "front principal [mm]" AS a,
        "nearest magnification" AS nearest, magnification,
        "working distance [mm]" AS stands, "working distance tolerance [mm]" AS room,
        CASE WHEN kind = 'telecentric' THEN 0 ELSE 1 / "pupil ratio" END AS psi,
        CASE WHEN kind = 'telecentric' THEN 0 ELSE 1 / "focal length [mm]" END AS phi
    FROM lenses
),
-- where the lens may stand: its magnifications at the greatest and at the least working distance
placed AS MATERIALIZED (
    SELECT *, row_number() OVER () AS number,
        CASE WHEN telecentric THEN magnification ELSE f / ($far + a - $z - f) END AS far_m,
        CASE WHEN telecentric THEN magnification
            WHEN $near + a - $z > f THEN f / ($near + a - $z - f) ELSE 'inf' END AS near_m
    FROM lens
    WHERE CASE WHEN telecentric THEN stands + $z - room <= $far AND stands + $z + room >= $near
        ELSE $far + a - $z > f END
),
-- what lens and stop demand by themselves: diffraction and detail from below, depth from above
opened AS (
    SELECT number, n, far_m, near_m, 1 / (2 * $feature * detail) AS detailed, 1.22 * $lambda * n AS airy, psi,
        greatest($above / (n * $blur), $above * phi) - psi AS nearer,
        $below / (n * $blur) - psi AS farther
    FROM (SELECT *, unnest(string_split(stops, ' '))::DOUBLE AS n FROM placed)
),
stop AS MATERIALIZED (
    SELECT number, n, lo, hi
    FROM (
        SELECT number, n, far_m, near_m,
            CASE WHEN $feature > airy * psi THEN greatest(airy / ($feature - airy * psi), detailed)
                ELSE 'inf' END AS lo,
            CASE WHEN greatest(nearer, farther) > 0 THEN 1 / greatest(nearer, farther) ELSE 'inf' END AS hi
        FROM opened
    )
    WHERE greatest(lo, far_m) <= least(hi, near_m) * (1 + 1e-12)
),
able AS (
    SELECT placed.*, greatest(far_m, stop.lo) AS least, least(near_m, stop.hi) AS most
    FROM placed JOIN (SELECT number, min(lo) AS lo, max(hi) AS hi FROM stop GROUP BY number) AS stop USING (number)
),
-- pairs that may fit: the sampling asked for and the field bound the magnification, whatever the pupil
possible AS (
    SELECT turned.number AS sensor, able.number AS lens, portrait, psi, phi, least, most, w, h, telecentric,
        turned.flange - able.flange AS extension, nearest,
        $W + w * ($above * phi - psi) AS w1,
        $H + h * ($above * phi - psi) AS h1,
        $sampling - mosaic * pitch * (psi + $below * phi) AS s1,
        mosaic * pitch AS pixel
    FROM turned JOIN able ON turned.thread = able.thread
        AND sqrt(w * w + h * h) <= circle * (1 + 1e-12)
        AND mosaic * pitch / $sampling <= most * (1 + 1e-9)
        AND least(w / $W, h / $H) * (1 + 1e-9) >= least
),
rooted AS (
    SELECT *,
        sqrt(w1 * w1 + 4 * $W * psi * w) AS w_root,
        sqrt(h1 * h1 + 4 * $H * psi * h) AS h_root,
        sqrt(s1 * s1 + 4 * $sampling * psi * pixel) AS s_root
    FROM possible
),
-- roots of cover and sampling, written so that they neither cancel nor divide by zero; then the focus ring's travel
bounded AS (
    SELECT sensor, lens, portrait, least, most,
        greatest(
            CASE WHEN s1 >= 0 THEN 2 * pixel / (s1 + s_root) ELSE (s_root - s1) / (2 * $sampling * psi) END,
            CASE WHEN telecentric THEN 0 ELSE extension * phi END
        ) AS lo,
        least(
            CASE WHEN w1 >= 0 THEN 2 * w / (w1 + w_root) ELSE (w_root - w1) / (2 * $W * psi) END,
            CASE WHEN h1 >= 0 THEN 2 * h / (h1 + h_root) ELSE (h_root - h1) / (2 * $H * psi) END,
            CASE WHEN NOT telecentric THEN extension * phi + nearest WHEN abs(extension) <= 0.01 THEN 'inf' ELSE 0 END
        ) AS hi
    FROM rooted
),
pair AS (
    SELECT sensor, lens, portrait, lo, hi
    FROM bounded
    WHERE greatest(lo, least) <= least(hi, most) * (1 + 1e-12)
),
-- every stop that fits, at its working point
standing AS MATERIALIZED (
    SELECT sensor, lens, portrait, n,
        CASE WHEN telecentric THEN magnification ELSE least(greatest(sqrt(lo * hi), far_m), near_m) END AS m,
        least(m / lo, hi / m) AS room
    FROM (
        SELECT pair.sensor, pair.lens, portrait, n, greatest(pair.lo, stop.lo) AS lo, least(pair.hi, stop.hi) AS hi
        FROM pair JOIN stop ON stop.number = pair.lens
    ) JOIN placed ON placed.number = lens
    WHERE greatest(lo, far_m) <= least(hi, near_m) * (1 + 1e-12)
),
graded AS MATERIALIZED (
    SELECT *,
        CASE WHEN room * room * (1 + 1e-9) >= 1 + $comfort THEN 0
            WHEN room * room * (1 + 1e-9) >= 1 + $comfort / 2 THEN 1 ELSE 2 END AS grade
    FROM (SELECT sensor, lens, max(room) AS room FROM standing GROUP BY sensor, lens)
),
-- the pairs of sensor and lens that hold the first hundred, by grade and cheapest camera
front AS MATERIALIZED (
    SELECT graded.sensor, graded.lens, grade
    FROM graded JOIN sensor ON sensor.number = graded.sensor JOIN placed ON placed.number = graded.lens
    QUALIFY rank() OVER (ORDER BY grade, round(sensor.price + placed.price, 6)) <= $top
),
-- of each the best stop each way round: by grade, then the least blur of focus and diffraction, then the smaller number
stopped AS (
    SELECT sensor, lens, portrait, n, greatest(pow(room, 2) - 1, 0) AS latitude, grade
    FROM (
        SELECT standing.*,
            CASE WHEN telecentric
                THEN least(
                    greatest(least(greatest(stands + $z, $near), $far), stands + $z - placed.room),
                    stands + $z + placed.room
                )
                ELSE f * (1 + 1 / m) - a + $z END / 100 AS least_defocus,
            psi, phi, front.grade AS best,
            CASE WHEN standing.room * standing.room * (1 + 1e-9) >= 1 + $comfort THEN 0
                WHEN standing.room * standing.room * (1 + 1e-9) >= 1 + $comfort / 2 THEN 1 ELSE 2 END AS grade
        FROM front JOIN standing USING (sensor, lens) JOIN placed ON placed.number = lens
    )
    WHERE grade = best
    QUALIFY row_number() OVER (
        PARTITION BY sensor, lens, portrait
        ORDER BY
            CASE WHEN 1 / m + psi > greatest($above, least_defocus) * phi
                THEN sqrt(pow(greatest($above, $below, least_defocus) / (n * (1 / m + psi)), 2)
                    + pow(2.44 * $lambda * n * (1 / m + psi), 2))
                ELSE 'inf' END,
            n
    ) = 1
),
chosen AS (
    SELECT *
    FROM stopped
    QUALIFY row_number() OVER (PARTITION BY sensor, lens ORDER BY latitude DESC, portrait) = 1
)
SELECT camera.id, placed.id,
    (SELECT sum(cameras)::BIGINT FROM graded JOIN sensor ON sensor.number = graded.sensor) AS fitting
FROM chosen
JOIN sensor ON sensor.number = chosen.sensor
JOIN camera USING (thread, flange, pitch, wide, high, mosaic)
JOIN placed ON placed.number = chosen.lens
ORDER BY chosen.grade, round(camera.price + placed.price, 6), chosen.latitude DESC, camera.id, placed.id
LIMIT $top
