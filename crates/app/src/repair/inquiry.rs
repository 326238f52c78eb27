//! The diagnosis, worked out beside the window and only when readings, plan or priors have changed.

use std::sync::Arc;
use std::sync::mpsc::{Receiver, Sender, TryRecvError, channel};
use std::thread;
use std::time::{Duration, Instant};

use crestline_plan::{Diagnosis, Fault, Plan, Priors, check, diagnose, suggested_frets};
use eframe::egui::Context;

/// Work that takes no longer than this is not spoken of.
const A_MOMENT: Duration = Duration::from_millis(300);

/// What is asked.
#[derive(Debug, Clone, PartialEq)]
struct Question {
    plan: Plan,
    priors: Priors,
}

/// What was found.
pub type Answer = Result<Arc<Diagnosis>, Vec<Fault>>;

/// What the work sends to the window.
enum News {
    Suggested(Vec<u32>),
    Done(Answer),
}

/// Work that is going on.
#[derive(Debug)]
struct Work {
    news: Receiver<News>,
    since: Instant,
    is_suggesting: bool,
}

/// The frets that are suggested for a plan without its readings.
#[derive(Debug)]
struct Suggestion {
    plan: Plan,
    frets: Vec<u32>,
}

/// The state of the diagnosis.
#[derive(Debug, Default)]
pub struct Inquiry {
    asked: Option<Question>,
    work: Option<Work>,
    suggestion: Option<Suggestion>,
    answer: Option<(Question, Answer)>,
    was_stopped: bool,
}

impl Inquiry {
    /// Takes what has been worked out and, where something else is to be worked out, begins that.
    pub fn follow(&mut self, ctx: &Context, plan: &Plan, priors: &Priors) {
        self.take_news();
        let current = self.asked.as_ref().is_some_and(|asked| asked.priors == *priors && asked.plan == *plan);
        if !current && self.work.is_none() {
            self.ask(ctx, Question { plan: plan.clone(), priors: *priors });
        }
        if let Some(work) = &self.work {
            // So that the time shown moves on; the end of the work comes with a repaint of its own.
            ctx.request_repaint_after(A_MOMENT.saturating_sub(work.since.elapsed()).max(A_MOMENT / 2));
        }
    }

    /// The last answer; none before there is one.
    #[must_use]
    pub fn answer(&self) -> Option<&Answer> {
        self.answer.as_ref().map(|(_, answer)| answer)
    }

    /// The diagnosis of exactly this plan with exactly these priors.
    #[must_use]
    pub fn diagnosis_of(&self, plan: &Plan, priors: &Priors) -> Option<Arc<Diagnosis>> {
        let (question, answer) = self.answer.as_ref()?;
        let fits = question.plan == *plan && question.priors == *priors;
        answer.as_ref().ok().filter(|_| fits).cloned()
    }

    /// The plan that the last answer is about.
    #[must_use]
    pub fn answered_plan(&self) -> Option<&Plan> {
        self.answer.as_ref().map(|(question, _)| &question.plan)
    }

    /// The frets that are suggested for reading; none while they are not known.
    #[must_use]
    pub fn suggested(&self) -> &[u32] {
        self.suggestion.as_ref().map_or(&[], |suggestion| &suggestion.frets)
    }

    /// Whether something is being worked out.
    #[must_use]
    pub fn is_working(&self) -> bool {
        self.work.is_some()
    }

    /// What is being worked out and for how long, in words, once it takes longer than a moment.
    #[must_use]
    pub fn progress(&self) -> Option<String> {
        let work = self.work.as_ref().filter(|work| work.since.elapsed() >= A_MOMENT)?;
        let what = if work.is_suggesting {
            "Step 1 of 2: which frets tell most"
        } else {
            "Step 2 of 2: the instrument behind the readings"
        };
        Some(format!("{what} … {:.0} s", work.since.elapsed().as_secs_f64()))
    }

    /// Stops waiting for the work that is going on, whose answer is then passed over.
    pub fn stop(&mut self) {
        self.was_stopped = self.work.take().is_some();
    }

    /// Whether the user stopped the work, so that the answer shown is not of the plan as it is.
    #[must_use]
    pub fn was_stopped(&self) -> bool {
        self.was_stopped
    }

    /// Works it out after all.
    pub fn resume(&mut self) {
        self.was_stopped = false;
        self.asked = None;
    }

    fn ask(&mut self, ctx: &Context, question: Question) {
        let (sender, news) = channel();
        let is_suggesting =
            !self.suggestion.as_ref().is_some_and(|known| known.plan == unread(&question.plan));
        let (asked, ctx) = (question.clone(), ctx.clone());
        let work = move || {
            work_out(&question, is_suggesting, &sender, &ctx);
            ctx.request_repaint();
        };
        self.asked = Some(asked);
        self.was_stopped = false;
        if thread::Builder::new().name("diagnosis".into()).spawn(work).is_ok() {
            self.work = Some(Work { news, since: Instant::now(), is_suggesting });
        }
    }

    fn take_news(&mut self) {
        while let (Some(work), Some(asked)) = (&mut self.work, &self.asked) {
            match work.news.try_recv() {
                Ok(News::Suggested(frets)) => {
                    self.suggestion = Some(Suggestion { plan: unread(&asked.plan), frets });
                    work.is_suggesting = false;
                }
                Ok(News::Done(answer)) => {
                    self.answer = Some((asked.clone(), answer));
                    self.work = None;
                }
                Err(TryRecvError::Disconnected) => self.work = None,
                Err(TryRecvError::Empty) => break,
            }
        }
    }
}

/// The plan without its readings, on which the suggestion depends.
fn unread(plan: &Plan) -> Plan {
    Plan { readings: Vec::new(), ..plan.clone() }
}

/// Works everything out and sends it on; nobody needs it any more where the window has gone or has stopped waiting.
fn work_out(question: &Question, is_suggesting: bool, news: &Sender<News>, ctx: &Context) {
    let checked = match check(&question.plan) {
        Ok(checked) => checked,
        Err(faults) => {
            let _ = news.send(News::Done(Err(faults)));
            return;
        }
    };
    if is_suggesting {
        // Where no frets can be suggested the diagnosis below says why.
        let frets = suggested_frets(&checked).unwrap_or_default();
        if news.send(News::Suggested(frets)).is_err() {
            return;
        }
        ctx.request_repaint();
    }
    let _ = news.send(News::Done(diagnose(&checked, &question.priors).map(Arc::new)));
}
