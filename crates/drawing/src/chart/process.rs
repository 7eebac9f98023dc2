//! What happens to the air: processes as arrows, mixing lines into the fog, lines carried on, sensible and latent legs.

use dewledger_checks::drawn::{Line, LineKind};
use dewledger_properties::MoistAir;
use dewledger_quantities::{Enthalpy, HumidityRatio, Pressure, Quantity};

use super::{Pen, polyline};
use crate::cross::{Cross, read};
use crate::geometry::Px;
use crate::labels::Spot;
use crate::node::Node;
use crate::text::Anchor;
use crate::window::Place;

/// Pieces of a mixing line, which bends a little in these axes.
const PIECES: u32 = 16;
/// Shorter lines carry no arrowhead, in sizes of the text.
const SHORT: f64 = 2.0;
/// Shorter legs are not drawn, px.
const SHORT_LEG: f64 = 6.0;

pub(super) fn place(air: &MoistAir) -> Place {
    Place { dry_bulb: air.dry_bulb(), humidity_ratio: air.humidity_ratio() }
}

/// Both ends of a line.
pub(super) fn ends(line: &Line) -> [Place; 2] {
    [place(&line.from), place(&line.to)]
}

/// The mixtures of two streams, all water as vapour: enthalpy and humidity ratio go in step from one to the other.
pub(crate) fn mixtures(line: &Line) -> Vec<Place> {
    let (from, to) = (&line.from, &line.to);
    let pressure = Pressure::from_si(0.5 * (from.pressure().si() + to.pressure().si()));
    (0..=PIECES)
        .filter_map(|piece| {
            let share = f64::from(piece) / f64::from(PIECES);
            let of = |value: fn(&MoistAir) -> f64| value(from) + share * (value(to) - value(from));
            let h = Enthalpy::from_si(of(|air| air.enthalpy().si()));
            let w = HumidityRatio::from_si(of(|air| air.humidity_ratio().si()));
            match piece {
                0 => Some(place(from)),
                PIECES => Some(place(to)),
                _ => MoistAir::unchecked_from_enthalpy(h, w, pressure).ok().map(|air| place(&air)),
            }
        })
        .collect()
}

impl Pen<'_> {
    pub(super) fn process(&mut self) -> Vec<Node> {
        let mut nodes = self.legs();
        for line in self.chart.lines {
            let [from, to] = ends(line).map(|place| self.plot.px(&place));
            self.placer.line(from, to);
            match line.kind {
                LineKind::Process => {
                    nodes.push(polyline("pc-process", [from, to]));
                    nodes.extend(self.arrowhead(from, to));
                }
                LineKind::CarriedOn => nodes.push(polyline("pc-carried-on", [from, to])),
                LineKind::Mixing => nodes.extend(self.mixing(line)),
            }
        }
        nodes
    }

    /// A mixing line; dashed where the mixture would be fog.
    fn mixing(&self, line: &Line) -> Vec<Node> {
        let mut nodes = Vec::new();
        let mut run: Vec<Place> = Vec::new();
        let mut foggy = false;
        let class = |foggy: bool| if foggy { "pc-mixing-fog" } else { "pc-mixing" };
        for place in mixtures(line) {
            let now = matches!(read(&place, self.chart.pressure), Cross::Fog { .. });
            if now != foggy && run.len() > 1 {
                // The piece that crosses saturation belongs to what it enters.
                let last = run.last().copied();
                nodes.push(self.path(class(foggy), run.drain(..)));
                run.extend(last);
            }
            foggy = now;
            run.push(place);
        }
        if run.len() > 1 {
            nodes.push(self.path(class(foggy), run));
        }
        nodes
    }

    /// An open arrowhead a little past the middle, where neither end hides it.
    fn arrowhead(&self, from: Px, to: Px) -> Option<Node> {
        let size = self.sheet.text;
        if from.distance(to) < SHORT * size {
            return None;
        }
        let tip = from.between(to, 0.56);
        let back = (from.y - to.y).atan2(from.x - to.x);
        let barb = 0.75 * size;
        Some(polyline(
            "pc-process pc-arrow",
            [tip.towards(back - 0.65, barb), tip, tip.towards(back + 0.65, barb)],
        ))
    }

    /// The one process whose parts are known, if there is just one.
    fn split_line(&self) -> Option<(Px, Px, Px)> {
        self.chart.legs.as_ref()?;
        let mut processes = self.chart.lines.iter().filter(|line| line.kind == LineKind::Process);
        let (Some(line), None) = (processes.next(), processes.next()) else { return None };
        let [from, to] = ends(line).map(|place| self.plot.px(&place));
        Some((from, Px::new(from.x, to.y), to))
    }

    /// Round the corner: moisture at the entering dry bulb, then heat at the leaving humidity ratio.
    fn legs(&mut self) -> Vec<Node> {
        let Some((from, corner, to)) = self.split_line() else { return Vec::new() };
        let mut nodes = Vec::new();
        for (class, start, end) in [("pc-sensible", corner, to), ("pc-latent", from, corner)] {
            if start.distance(end) >= SHORT_LEG {
                nodes.push(polyline(class, [start, end]));
                self.placer.line(start, end);
            }
        }
        nodes
    }

    /// "sensible 33.4 kW" along its leg, "latent 7.9 kW" beside its own.
    pub(super) fn leg_names(&mut self) -> Vec<Node> {
        let (Some((from, corner, to)), Some(legs)) = (self.split_line(), self.chart.legs.clone())
        else {
            return Vec::new();
        };
        let size = self.sheet.text;
        let outward = if corner.y >= from.y { 1.0 } else { -1.0 };
        let mut names = Vec::new();
        for (name, value, start, end) in
            [("sensible", legs.sensible, corner, to), ("latent", legs.latent, from, corner)]
        {
            if start.distance(end) < SHORT_LEG || !self.plot.area.contains(start.between(end, 0.5))
            {
                continue;
            }
            let text = format!("{name} {value}");
            let mut spots: Vec<Spot> = Vec::new();
            for (index, share) in [0.5, 0.35, 0.65, 0.2, 0.8].into_iter().enumerate() {
                let at = start.between(end, share);
                let cost = 8.0 * f64::from(u32::try_from(index).unwrap_or(u32::MAX));
                if name == "sensible" {
                    for (side, more) in [(outward, 0.0), (-outward, 30.0)] {
                        for far in [1.15, 1.6, 2.3, 3.2] {
                            let y = at.y + side * far * size + 0.35 * size;
                            let spot = Px::new(at.x, y);
                            spots.push(self.spot(
                                &text,
                                spot,
                                Anchor::Middle,
                                false,
                                cost + more + 10.0 * far,
                            ));
                        }
                    }
                } else {
                    let away = if to.x <= from.x { 1.0 } else { -1.0 };
                    for (side, more) in [(away, 0.0), (-away, 40.0)] {
                        let anchor = if side > 0.0 { Anchor::Start } else { Anchor::End };
                        let spot = Px::new(at.x + side * 0.85 * size, at.y + 0.35 * size);
                        spots.push(self.spot(&text, spot, anchor, false, cost + more));
                    }
                    for down in [1.6, -1.0, 2.9, -2.3] {
                        let spot = Px::new(at.x, at.y + down * size);
                        spots.push(self.spot(&text, spot, Anchor::Start, false, cost + 60.0));
                        spots.push(self.spot(&text, spot, Anchor::End, false, cost + 70.0));
                    }
                }
            }
            if let Some(spot) = self.placer.place(spots) {
                names.push(self.words("pc-leg-name", &spot, &text));
            }
        }
        names
    }
}
