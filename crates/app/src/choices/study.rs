//! What the page shows, worked out beside the window and only when the plan has changed.

use std::sync::mpsc::{Receiver, TryRecvError, channel};
use std::thread;

use crestline_plan::{
    BenchLayout, Comparison, Fault, Plan, Step, Workshop, bench_layout, check, compare, solve, workshop,
};
use eframe::egui::Context;

/// Everything that the page shows of one plan.
#[derive(Debug, Clone, PartialEq)]
pub struct Figures {
    /// All pairs of styles.
    pub comparison: Comparison,
    /// Rounded setbacks and sensitivities.
    pub workshop: Workshop,
    /// Places from the datum.
    pub bench: BenchLayout,
}

#[derive(Debug, Clone, PartialEq)]
struct Question {
    plan: Plan,
    step: Step,
}

type Answer = Result<Figures, Vec<Fault>>;

/// The state of the page.
#[derive(Debug)]
pub struct Study {
    /// The step in which the maker sets out.
    pub step: Step,
    asked: Option<Question>,
    coming: Option<Receiver<Answer>>,
    answer: Option<(Question, Answer)>,
}

impl Default for Study {
    fn default() -> Self {
        Self { step: Step::Mm01, asked: None, coming: None, answer: None }
    }
}

impl Study {
    /// The figures of a plan, or the last ones while those of this plan are still being worked out.
    pub fn figures(&mut self, ctx: &Context, plan: &Plan) -> Option<&Answer> {
        self.take_answer();
        let current = self.asked.as_ref().is_some_and(|asked| asked.step == self.step && asked.plan == *plan);
        if !current && self.coming.is_none() {
            self.ask(ctx, Question { plan: plan.clone(), step: self.step });
            self.take_answer();
        }
        self.answer.as_ref().map(|(_, answer)| answer)
    }

    /// Whether figures are still being worked out.
    #[must_use]
    pub fn is_working(&self) -> bool {
        self.coming.is_some()
    }

    fn ask(&mut self, ctx: &Context, question: Question) {
        let (sender, coming) = channel();
        let (asked, ctx) = (question.clone(), ctx.clone());
        let work = move || {
            // The window may have gone by then; nobody needs the answer any more.
            let _ = sender.send(work_out(&question));
            ctx.request_repaint();
        };
        self.asked = Some(asked);
        if thread::Builder::new().name("comparison".into()).spawn(work).is_ok() {
            self.coming = Some(coming);
        }
    }

    fn take_answer(&mut self) {
        let Some(coming) = &self.coming else { return };
        match coming.try_recv() {
            Ok(answer) => {
                self.answer = self.asked.clone().map(|asked| (asked, answer));
                self.coming = None;
            }
            Err(TryRecvError::Disconnected) => self.coming = None,
            Err(TryRecvError::Empty) => {}
        }
    }
}

fn work_out(question: &Question) -> Answer {
    let checked = check(&question.plan)?;
    let solution = solve(&checked)?;
    Ok(Figures {
        comparison: compare(&checked)?,
        workshop: workshop(&checked, &solution, question.step)?,
        bench: bench_layout(&checked, &solution),
    })
}
